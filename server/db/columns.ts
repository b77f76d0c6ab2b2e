import { type AnyColumn, type SQL, sql } from 'drizzle-orm';
import { check, customType, integer, timestamp } from 'drizzle-orm/pg-core';
import type { z } from 'zod';
import { formatRange, parseRange, type InstantSpan } from './range-text.ts';

/** The record number people say. */
export function id() {
  return integer('id').primaryKey().generatedAlwaysAsIdentity();
}

/** An instant, to the millisecond, so that it comes back from the database as it went in. */
export function instant(name: string) {
  return timestamp(name, { withTimezone: true, mode: 'date', precision: 3 });
}

/** Both are given by the application's clock. */
export function timestamps() {
  return {
    createdAt: instant('created_at').notNull(),
    updatedAt: instant('updated_at').notNull(),
  };
}

/** What an edit names to prove that it saw the current row. */
export function version() {
  return integer('version').notNull().default(1);
}

export const tstzrange = customType<{ data: InstantSpan; driverData: string }>({
  dataType: () => 'tstzrange',
  toDriver: formatRange,
  fromDriver: parseRange,
});

export const bytea = customType<{ data: Buffer; driverData: Buffer }>({
  dataType: () => 'bytea',
});

/** jsonb whose shape is checked on the way in and on the way out. */
export function checkedJson<Schema extends z.ZodType>(name: string, schema: Schema) {
  return customType<{ data: z.output<Schema>; driverData: unknown }>({
    dataType: () => 'jsonb',
    toDriver: (value) => JSON.stringify(schema.parse(value)),
    fromDriver: (value) => schema.parse(value),
  })(name);
}

/** A CHECK that the column holds one of a shared list's words. */
export function oneOf(name: string, column: AnyColumn, words: readonly string[]) {
  return check(name, sql`${column} in (${quotedWords(words)})`);
}

/** A CHECK that every element of a text array is one of a shared list's words. */
export function eachOneOf(name: string, column: AnyColumn, words: readonly string[]) {
  return check(name, sql`${column} <@ array[${quotedWords(words)}]::text[]`);
}

/** A CHECK that a range is half-open, bounded and not empty. */
export function properRange(name: string, column: AnyColumn) {
  return check(
    name,
    sql`not isempty(${column}) and lower_inc(${column}) and not upper_inc(${column}) and not lower_inf(${column}) and not upper_inf(${column})`,
  );
}

function quotedWords(words: readonly string[]): SQL {
  return sql.raw(words.map((word) => `'${word.replaceAll("'", "''")}'`).join(', '));
}

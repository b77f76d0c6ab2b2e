import { z } from 'zod';
import { defaultPageSize } from '#shared/contracts/common.ts';
import { problem } from './problem.ts';

export type PageQuery = { readonly cursor?: string; readonly limit?: number };
export type Page<Item> = { items: Item[]; nextCursor: string | null };

const cursorSchema = z.tuple([z.string(), z.unknown()]);

/** An opaque cursor: the sort key of the last row shown, and the sort it belongs to. */
export function encodeCursor(sort: string, after: readonly (string | number | null)[]): string {
  return Buffer.from(JSON.stringify([sort, after])).toString('base64url');
}

/** The sort key to go on after; undefined at the start. A cursor of another sort is refused. */
export function decodeCursor<Key extends z.ZodType>(
  sort: string,
  key: Key,
  cursor: string | undefined,
): z.output<Key> | undefined {
  if (cursor === undefined) {
    return undefined;
  }
  const [writtenFor, after] = cursorSchema.catch(['', null]).parse(readJson(cursor));
  const parsed = key.safeParse(after);
  if (writtenFor !== sort || !parsed.success) {
    throw problem('input.invalid', {
      detail: 'The list cannot go on from there. Start it again without a cursor.',
      errors: [{ detail: 'is not a cursor of this list and sort', pointer: '#/query/cursor' }],
    });
  }
  return parsed.data;
}

/** How many rows to read: one more than shown tells whether there is a next page. */
export function rowsToRead(query: PageQuery): number {
  return (query.limit ?? defaultPageSize) + 1;
}

/** Cuts the extra row off and makes the cursor from the last one shown. */
export function toPage<Row, Item>(
  rows: readonly Row[],
  query: PageQuery,
  present: (row: Row) => Item,
  cursorOf: (row: Row) => string,
): Page<Item> {
  const limit = query.limit ?? defaultPageSize;
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  return {
    items: shown.map(present),
    nextCursor: rows.length > limit && last !== undefined ? cursorOf(last) : null,
  };
}

function readJson(cursor: string): unknown {
  try {
    const value: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
    return value;
  } catch (error) {
    if (error instanceof SyntaxError) {
      return null;
    }
    throw error;
  }
}

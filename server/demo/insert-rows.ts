import { sql } from 'drizzle-orm';
import { getTableConfig, type PgInsertValue, type PgTable } from 'drizzle-orm/pg-core';
import type { Tx } from '#server/db/client.ts';

/** The server takes at most 65 535 values in one statement. */
const maxValuesPerStatement = 20_000;

/** Writes rows that bring no record numbers, in as few statements as it takes. */
export async function insertRows<Table extends PgTable>(
  tx: Tx,
  table: Table,
  rows: readonly PgInsertValue<Table>[],
): Promise<void> {
  for (const part of parts(table, rows)) {
    await tx.insert(table).values(part);
  }
}

/** Writes rows under the record numbers they bring; numbers given later go on after the highest. */
export async function insertNumberedRows<Table extends PgTable>(
  tx: Tx,
  table: Table,
  rows: readonly PgInsertValue<Table, true>[],
): Promise<void> {
  for (const part of parts(table, rows)) {
    await tx.insert(table).overridingSystemValue().values(part);
  }
  const { columns, name } = getTableConfig(table);
  if (rows.length > 0 && columns.some((column) => column.generatedIdentity !== undefined)) {
    await tx.execute(
      sql`select setval(pg_get_serial_sequence(${name}, 'id'), (select max(id) from ${table}))`,
    );
  }
}

function parts<Row>(table: PgTable, rows: readonly Row[]): Row[][] {
  const size = Math.floor(maxValuesPerStatement / getTableConfig(table).columns.length);
  return Array.from({ length: Math.ceil(rows.length / size) }, (_, index) =>
    rows.slice(index * size, (index + 1) * size),
  );
}

import { asc, eq } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { fileChunksTable, filesTable } from '#server/db/tables/file.table.ts';

const chunkBytes = 1024 * 1024;

export async function insertFile(
  tx: Tx,
  file: Omit<typeof filesTable.$inferInsert, 'sizeBytes'>,
  bytes: Uint8Array,
) {
  const [row] = await tx
    .insert(filesTable)
    .values({ ...file, sizeBytes: bytes.byteLength })
    .returning();
  if (row === undefined) {
    throw new Error('The database returned no file after writing one.');
  }
  for (let seq = 0; seq * chunkBytes < bytes.byteLength; seq += 1) {
    const chunk = bytes.subarray(seq * chunkBytes, (seq + 1) * chunkBytes);
    await tx.insert(fileChunksTable).values({ fileId: row.id, seq, bytes: Buffer.from(chunk) });
  }
  return row;
}

export async function findFileRow(db: Reader, id: number) {
  const [row] = await db.select().from(filesTable).where(eq(filesTable.id, id));
  return row;
}
export type FileRow = NonNullable<Awaited<ReturnType<typeof findFileRow>>>;

export async function readFileBytes(db: Reader, id: number): Promise<Buffer> {
  const chunks = await db
    .select({ bytes: fileChunksTable.bytes })
    .from(fileChunksTable)
    .where(eq(fileChunksTable.fileId, id))
    .orderBy(asc(fileChunksTable.seq));
  return Buffer.concat(chunks.map((chunk) => chunk.bytes));
}

import { and, asc, eq, notInArray, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Reader, Tx } from '#server/db/client.ts';
import { deviationsTable } from '#server/db/tables/check-result.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';

const d = deviationsTable;
const asker = alias(personsTable, 'asker');
const decider = alias(personsTable, 'decider');

function deviationRows(reader: Reader) {
  return reader
    .select({
      deviation: d,
      askedBy: asker.name,
      decidedBy: decider.name,
      siteId: requestsTable.siteId,
      grade: requestsTable.grade,
      requesterId: requestsTable.requesterId,
      requestState: requestsTable.state,
      projectId: requestsTable.projectId,
    })
    .from(d)
    .innerJoin(requestsTable, eq(requestsTable.id, d.requestId))
    .innerJoin(asker, eq(asker.id, d.requestedById))
    .leftJoin(decider, eq(decider.id, d.decidedById));
}

export async function listOfRequest(reader: Reader, requestId: number) {
  return deviationRows(reader).where(eq(d.requestId, requestId)).orderBy(asc(d.id));
}
export type DeviationRecord = Awaited<ReturnType<typeof listOfRequest>>[number];

/** The request a deviation was asked for; null where there is none of that number. */
export async function findRequestOf(reader: Reader, id: number): Promise<number | null> {
  const [row] = await reader.select({ requestId: d.requestId }).from(d).where(eq(d.id, id));
  return row?.requestId ?? null;
}

/** Locked until the transaction ends, so that of two deciders one waits. */
export async function lockDeviation(tx: Tx, siteId: number, id: number) {
  await tx.select({ id: d.id }).from(d).where(eq(d.id, id)).for('no key update');
  const [row] = await deviationRows(tx).where(and(eq(requestsTable.siteId, siteId), eq(d.id, id)));
  return row;
}

/** Those that wait for a decision at a site, oldest first; of a request that is over none does. */
export async function listAsked(reader: Reader, siteId: number) {
  return deviationRows(reader)
    .where(
      and(
        eq(requestsTable.siteId, siteId),
        eq(d.state, 'asked'),
        notInArray(requestsTable.state, ['done', 'withdrawn']),
      ),
    )
    .orderBy(asc(d.requestedAt), asc(d.id));
}

export async function insertDeviation(
  tx: Tx,
  values: {
    readonly requestId: number;
    readonly checkCode: CheckCode;
    readonly reason: string;
    readonly requestedById: number;
    readonly at: Date;
  },
): Promise<number> {
  const { at, ...rest } = values;
  const [made] = await tx
    .insert(d)
    .values({ ...rest, state: 'asked', requestedAt: at, createdAt: at, updatedAt: at })
    .returning({ id: d.id });
  if (made === undefined) {
    throw new Error('No deviation was written.');
  }
  return made.id;
}

export async function writeDecision(
  tx: Tx,
  id: number,
  decision: {
    readonly state: 'granted' | 'refused';
    readonly decisionReason: string;
    readonly customerAcceptance: string | null;
    readonly decidedById: number;
    readonly decidedAt: Date;
    readonly expiresAt: Date | null;
  },
): Promise<void> {
  await tx
    .update(d)
    .set({ ...decision, updatedAt: decision.decidedAt, version: sql`${d.version} + 1` })
    .where(eq(d.id, id));
}

import { sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Reader, Tx } from '#server/db/client.ts';

/** Held by the one that seals. */
const sealLock = 5_471_005;

/** False where another worker is at it. Held to the end of the transaction. */
export async function tryLockChain(tx: Tx): Promise<boolean> {
  const { rows } = await tx.execute(sql`select pg_try_advisory_xact_lock(${sealLock}) as "isMine"`);
  return z.object({ isMine: z.boolean() }).parse(rows[0]).isMine;
}

const headSchema = z.object({ sealNo: z.coerce.number(), hash: z.string() });
export type ChainHead = z.infer<typeof headSchema>;

/** The last sealed row; null where the chain has not begun. */
export async function findChainHead(db: Reader): Promise<ChainHead | null> {
  const { rows } = await db.execute(sql`
    select seal_no as "sealNo", hash from audit_event
    where seal_no is not null order by seal_no desc limit 1`);
  return rows[0] === undefined ? null : headSchema.parse(rows[0]);
}

const contentSchema = z.object({
  id: z.coerce.number(),
  at: z.string(),
  actorId: z.number().nullable(),
  siteId: z.number().nullable(),
  action: z.string(),
  subjectKind: z.string(),
  subjectId: z.number().nullable(),
  before: z.string().nullable(),
  after: z.string().nullable(),
  requestId: z.string().nullable(),
});
const contentColumns = sql`
  id, to_char(at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as at,
  actor_id as "actorId", site_id as "siteId", action, subject_kind as "subjectKind",
  subject_id as "subjectId", before::text as before, after::text as after,
  request_id as "requestId"`;

/**
 * Unsealed rows of transactions older than every transaction still running, oldest transaction first.
 * A row that commits late then always comes after those sealed before it, also by its transaction's
 * number: the order of the chain does not depend on when the sealer happened to look.
 */
export async function listSealable(tx: Tx, limit: number) {
  const { rows } = await tx.execute(sql`
    select ${contentColumns} from audit_event
    where seal_no is null
      and age(xmin) > age(pg_snapshot_xmin(pg_current_snapshot())::xid)
    order by age(xmin) desc, id
    limit ${limit}`);
  return z.array(contentSchema).parse(rows);
}

export type Seal = { readonly id: number; readonly sealNo: number; readonly hash: string };

/** Each row's seal; `prevHash` is the hash before the first of them. */
export async function writeSeals(tx: Tx, prevHash: string, seals: readonly Seal[]): Promise<void> {
  const list = JSON.stringify(
    seals.map((seal, index) => ({ ...seal, prevHash: seals[index - 1]?.hash ?? prevHash })),
  );
  await tx.execute(sql`
    update audit_event set seal_no = s."sealNo", prev_hash = s."prevHash", hash = s.hash
    from jsonb_to_recordset(${list}::jsonb)
      as s (id bigint, "sealNo" bigint, "prevHash" text, hash text)
    where audit_event.id = s.id`);
}

const sealedSchema = contentSchema.extend({
  sealNo: z.coerce.number(),
  prevHash: z.string(),
  hash: z.string(),
});
export type SealedRow = z.infer<typeof sealedSchema>;

/** Along the chain. */
export async function listSealed(
  db: Reader,
  afterSealNo: number,
  limit: number,
): Promise<SealedRow[]> {
  const { rows } = await db.execute(sql`
    select ${contentColumns}, seal_no as "sealNo", prev_hash as "prevHash", hash
    from audit_event where seal_no > ${afterSealNo} order by seal_no limit ${limit}`);
  return z.array(sealedSchema).parse(rows);
}

const tailSchema = z.object({ count: z.coerce.number(), oldestAt: z.coerce.date().nullable() });

export async function getUnsealedTail(db: Reader) {
  const { rows } = await db.execute(sql`
    select count(*) as count, min(at) as "oldestAt" from audit_event where seal_no is null`);
  return tailSchema.parse(rows[0]);
}

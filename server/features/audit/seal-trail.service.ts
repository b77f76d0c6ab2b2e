import type { Deps } from '#server/deps.ts';
import { chainStart, sealHash } from './seal-hash.ts';
import {
  findChainHead,
  getUnsealedTail,
  listSealable,
  listSealed,
  tryLockChain,
  writeSeals,
} from './seal.repository.ts';
import type { Seal, SealedRow } from './seal.repository.ts';

const batchSize = 500;

/**
 * Chains what was committed since the last time; gives how many rows. Only one seals at a time, and a
 * row is sealed once.
 */
export async function sealTrail(deps: Pick<Deps, 'transact'>): Promise<number> {
  let total = 0;
  for (;;) {
    const count = await sealBatch(deps);
    total += count;
    if (count < batchSize) {
      return total;
    }
  }
}

async function sealBatch(deps: Pick<Deps, 'transact'>): Promise<number> {
  return deps.transact(async (tx) => {
    if (!(await tryLockChain(tx))) {
      return 0;
    }
    const rows = await listSealable(tx, batchSize);
    if (rows.length === 0) {
      return 0;
    }
    const head = (await findChainHead(tx)) ?? { sealNo: 0, hash: chainStart };
    const seals: Seal[] = [];
    let { sealNo, hash } = head;
    for (const row of rows) {
      sealNo += 1;
      hash = sealHash(hash, sealNo, row);
      seals.push({ id: row.id, sealNo, hash });
    }
    await writeSeals(tx, head.hash, seals);
    return rows.length;
  });
}

export type ChainBreak = {
  readonly sealNo: number;
  readonly eventId: number | null;
  readonly reason: string;
};
export type TrailVerdict = {
  readonly verifiedCount: number;
  /** Hash of the last good row. Noted elsewhere, it shows later whether the end was cut off. */
  readonly headHash: string;
  readonly firstBreak: ChainBreak | null;
  readonly unsealedCount: number;
  readonly oldestUnsealedAt: Date | null;
};
/** A place of the chain that was noted earlier. */
export type NotedHead = { readonly sealNo: number; readonly hash: string };

/** Walks the chain from its start and stops at the first row that is not as it was sealed. */
export async function verifyTrail(
  deps: Pick<Deps, 'db'>,
  noted: NotedHead | null = null,
): Promise<TrailVerdict> {
  let verifiedCount = 0;
  let headHash = chainStart;
  let firstBreak: ChainBreak | null = null;
  while (firstBreak === null) {
    const rows = await listSealed(deps.db, verifiedCount, batchSize);
    for (const row of rows) {
      const reason = faultOf(row, verifiedCount + 1, headHash, noted);
      if (reason !== null) {
        firstBreak = { sealNo: verifiedCount + 1, eventId: row.id, reason };
        break;
      }
      verifiedCount = row.sealNo;
      headHash = row.hash;
    }
    if (rows.length < batchSize) {
      break;
    }
  }
  if (firstBreak === null && noted !== null && noted.sealNo > verifiedCount) {
    const reason = `the chain ends at ${verifiedCount}, but ${noted.sealNo} was noted: its end is gone`;
    firstBreak = { sealNo: verifiedCount + 1, eventId: null, reason };
  }
  const tail = await getUnsealedTail(deps.db);
  return {
    verifiedCount,
    headHash,
    firstBreak,
    unsealedCount: tail.count,
    oldestUnsealedAt: tail.oldestAt,
  };
}

function faultOf(
  row: SealedRow,
  sealNo: number,
  prevHash: string,
  noted: NotedHead | null,
): string | null {
  if (row.sealNo !== sealNo) {
    return `the next row is number ${row.sealNo}: rows are missing`;
  }
  if (row.prevHash !== prevHash) {
    return 'it does not follow the row before it';
  }
  if (row.hash !== sealHash(prevHash, sealNo, row)) {
    return 'its content is not what was sealed';
  }
  if (noted?.sealNo === sealNo && noted.hash !== row.hash) {
    return 'another hash was noted here: the chain was made anew';
  }
  return null;
}

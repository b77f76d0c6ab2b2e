import { createHash } from 'node:crypto';
import { z } from 'zod';
import { problem } from '#server/problem.ts';
import type { Contract } from '#shared/contracts/define-contract.ts';
import type { Tx } from '#server/db/client.ts';
import { claimKey, findAnswer, storeAnswer } from './idempotency.repository.ts';
import type { Answer, KeyedCall } from './idempotency.repository.ts';
import type { RawInput } from './raw-input.ts';

const keySchema = z.uuid();

/** Reads the key of a creating call; without one a repeat could not be told from a second wish. */
export function requireKey(given: string | undefined): string {
  const parsed = keySchema.safeParse(given);
  if (!parsed.success) {
    throw problem('idempotency.missing', {
      detail: 'Send the header Idempotency-Key with a UUID that is new for each thing you create.',
    });
  }
  return parsed.data.toLowerCase();
}

/** What must be equal for a call to count as a repeat of another. */
export function hashRequest(contract: Contract, raw: RawInput): string {
  const { body } = raw;
  const isBinary = body instanceof Uint8Array;
  const rest = { params: raw.params, query: raw.query, ...(isBinary ? {} : { body }) };
  const hash = createHash('sha256').update(`${contract.name}\n${JSON.stringify(rest)}`);
  return (isBinary ? hash.update(body) : hash).digest('hex');
}

/**
 * Runs a creating call once for its key. The key row is written in the transaction of the change: a
 * second caller with the same key waits on it and then gets the first answer; where the first was
 * refused and rolled back, the second runs.
 */
export async function answerOnce(
  tx: Tx,
  call: KeyedCall,
  work: () => Promise<Answer>,
): Promise<Answer> {
  if (!(await claimKey(tx, call))) {
    return replay(tx, call);
  }
  const answer = await work();
  await storeAnswer(tx, call, answer);
  return answer;
}

async function replay(tx: Tx, call: KeyedCall): Promise<Answer> {
  const stored = await findAnswer(tx, call);
  if (stored === undefined || stored.status === null) {
    throw new Error('An idempotency key was committed without its answer.');
  }
  if (stored.contract !== call.contract || stored.requestHash !== call.requestHash) {
    throw problem('idempotency.reused', {
      detail: 'This Idempotency-Key came with another request before. Send a new key.',
    });
  }
  return { status: stored.status, body: stored.response };
}

import type { Tx } from '#server/db/client.ts';
import type { RequestState } from '#shared/domain/states.ts';
import { countBookedLots, updateRequestState } from './booking-writes.repository.ts';

/** Sets a request to what its lots say: none, some or all of them booked. The request is locked. */
export async function settleRequestState(tx: Tx, requestId: number, at: Date): Promise<void> {
  const { lots, booked } = await countBookedLots(tx, requestId);
  const state: RequestState =
    booked === 0 ? 'submitted' : booked < lots ? 'partly-booked' : 'booked';
  await updateRequestState(tx, requestId, state, at);
}

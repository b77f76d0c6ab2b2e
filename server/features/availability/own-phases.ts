import { z } from 'zod';
import { loadPhases } from '#shared/domain/hold-estimate/types.ts';
import type { LoadMember } from '#shared/domain/facility/types.ts';

/**
 * What a booking keeps of its own phase lengths, in whole seconds: `{ "connect": 780, "hold": 21600 }`.
 * A phase of no length is left out, and so is `wait`, which belongs to the load.
 */
export const ownPhasesSchema = z.partialRecord(z.enum(loadPhases), z.number().min(0));

/** Reads the stored lengths; a row that holds anything else stops the reading. */
export function readOwnPhases(stored: unknown, bookingId: number): LoadMember['needsS'] {
  const parsed = ownPhasesSchema.safeParse(stored);
  if (!parsed.success) {
    throw new Error(
      `Booking ${bookingId} holds no readable phase lengths: ${parsed.error.message}`,
    );
  }
  return parsed.data;
}

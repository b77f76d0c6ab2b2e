import type { PhaseSpan } from '#shared/domain/facility/types.ts';

/**
 * Phases with the wait (where there is one) and the unload added, both at the idle temperature.
 *
 * @param unload when the unload starts and ends, epoch ms
 * @example closePhases([], { startMs: 0, endMs: 900_000 }, 25) // one unload
 */
export function closePhases(
  stacked: readonly PhaseSpan[],
  unload: { readonly startMs: number; readonly endMs: number },
  idleTemperatureC: number,
): readonly PhaseSpan[] {
  const setTemperatureC = idleTemperatureC;
  const returnedMs = stacked.at(-1)?.endMs ?? unload.startMs;
  const phases = [...stacked];
  if (returnedMs < unload.startMs) {
    phases.push({ phase: 'wait', startMs: returnedMs, endMs: unload.startMs, setTemperatureC });
  }
  phases.push({ phase: 'unload', ...unload, setTemperatureC });
  return phases;
}

/** Starts, ends and attended phases lie on quarter hours of UTC. */
export const gridMs = 900_000;

/**
 * The first quarter hour of UTC that is not before an instant; also rounds a length up to quarter hours.
 *
 * @param valueMs ms
 * @example roundUpToGrid(1) // 900000
 */
export function roundUpToGrid(valueMs: number): number {
  return Math.ceil(valueMs / gridMs) * gridMs;
}

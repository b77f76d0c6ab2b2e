import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Steady current that a drifting source voltage pushes into the cell: i = C·(dV/dt). One microvolt
 * an hour is C/3.6e9 A.
 *
 * @param input.driftUvPerH drift of the source, µV/h, with sign
 * @returns A, positive into the cell
 * @throws RangeError when C is not above zero or the drift is not finite
 * @example sourceDriftCurrent({ capacitanceF: 14000, driftUvPerH: 1 }) // 3.888...e-6
 */
export function sourceDriftCurrent(input: {
  readonly capacitanceF: number;
  readonly driftUvPerH: number;
}): number {
  return (
    (requirePositive(input.capacitanceF, 'capacitanceF') *
      requireFinite(input.driftUvPerH, 'driftUvPerH')) /
    3.6e9
  );
}

export type Vessel = {
  readonly tag: string;
  readonly temperatureC: number | null;
  readonly taken: number;
  readonly positions: number;
  /** `stale`: the log is too old to say the temperature; `out`: out of use. */
  readonly state: 'ok' | 'stale' | 'out';
  /** Said instead of the temperature where the chamber is out: `mapping`. */
  readonly why?: string | undefined;
  /** The whole state as one sentence: the name of the link. */
  readonly sentence: string;
  readonly href: string;
};

const bottom = 21;
const depth = 19.5;

/** Where the water stands in a vessel 22 px high; the walls reach from 0 to 21. */
export function waterLevel(vessel: Pick<Vessel, 'taken' | 'positions'>): {
  y: number;
  height: number;
} {
  const share = vessel.positions === 0 ? 0 : Math.min(1, vessel.taken / vessel.positions);
  const height = share * depth;
  return { y: bottom - height, height };
}

export function countPositions(vessels: readonly Vessel[]): { taken: number; positions: number } {
  return {
    taken: vessels.reduce((sum, vessel) => sum + vessel.taken, 0),
    positions: vessels.reduce((sum, vessel) => sum + vessel.positions, 0),
  };
}

import { createDice, type Dice } from './dice.ts';
import { emptyRows, type DemoRows } from './demo-rows.ts';

/** What every part of the generator works with. */
export type DemoContext = {
  /** The moment the demo is seen from, on a quarter hour. */
  readonly nowMs: number;
  readonly rows: DemoRows;
  readonly diceFor: (name: string) => Dice;
  /** The next record number of a table. */
  readonly number: (table: keyof DemoRows) => number;
};

/** Numbers people say start where an older laboratory's would be. */
const firstNumbers: Partial<Record<keyof DemoRows, number>> = {
  requests: 380,
  lots: 512,
  bookings: 1640,
  loads: 706,
  calibrations: 5600,
  outages: 210,
  duties: 40,
  assessments: 130,
  cells: 3000,
};

export function createContext(input: { seed: number; nowMs: number }): DemoContext {
  const given = new Map<keyof DemoRows, number>();
  function number(table: keyof DemoRows): number {
    const next = given.get(table) ?? firstNumbers[table] ?? 1;
    given.set(table, next + 1);
    return next;
  }
  return {
    nowMs: Math.floor(input.nowMs / 900_000) * 900_000,
    rows: emptyRows(),
    diceFor: (name) => createDice(input.seed, name),
    number,
  };
}

/** Creation and last change at one instant. */
export function stamped(atMs: number, changedMs = atMs): { createdAt: Date; updatedAt: Date } {
  return { createdAt: new Date(atMs), updatedAt: new Date(changedMs) };
}

/** Reads a map that was filled a moment ago; a gap is a fault of the generator itself. */
export function known<Key, Value>(map: ReadonlyMap<Key, Value>, key: Key): Value {
  const value = map.get(key);
  if (value === undefined) {
    throw new RangeError(`The demo knows nothing about ${String(key)}.`);
  }
  return value;
}

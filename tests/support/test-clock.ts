import type { Clock } from '#server/clock.ts';

export type TestClock = Clock & {
  set(instant: string): void;
  advance(by: { hours?: number; minutes?: number; seconds?: number }): void;
};

/** Time that moves only when a test says so. */
export function createTestClock(start = '2026-03-02T08:00:00Z'): TestClock {
  let nowMs = Date.parse(start);
  return {
    now: () => new Date(nowMs),
    set(instant) {
      nowMs = Date.parse(instant);
    },
    advance({ hours = 0, minutes = 0, seconds = 0 }) {
      nowMs += ((hours * 60 + minutes) * 60 + seconds) * 1000;
    },
  };
}

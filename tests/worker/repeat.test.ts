import { setTimeout as pause } from 'node:timers/promises';
import { expect, test } from 'vitest';
import { repeat } from '#worker/repeat.ts';
import { eventually } from '#tests/support/worker-bench.ts';

const never = 3_600_000;

/** Work that runs until it is let go. */
function stepwise() {
  let runs = 0;
  let underWay = 0;
  let most = 0;
  const waiting: (() => void)[] = [];
  return {
    runs: () => runs,
    most: () => most,
    letGo: () => waiting.shift()?.(),
    run: async () => {
      runs += 1;
      underWay += 1;
      most = Math.max(most, underWay);
      await new Promise<void>((resolve) => {
        waiting.push(resolve);
      });
      underWay -= 1;
    },
  };
}

test('woken while it works it runs once more, however often it was woken, and never twice at a time', async () => {
  const work = stepwise();
  const repeating = repeat({ everyMs: never, run: work.run, onError: () => undefined });
  repeating.wake();
  repeating.wake();
  expect(work.runs()).toBe(1);
  work.letGo();
  await eventually('the second run', () => (work.runs() === 2 ? true : undefined));
  const stopped = repeating.stop();
  work.letGo();
  await stopped;
  expect([work.runs(), work.most()]).toEqual([2, 1]);
});

test('woken while it pauses it runs at once', async () => {
  let runs = 0;
  const repeating = repeat({
    everyMs: never,
    run: () => {
      runs += 1;
      return Promise.resolve();
    },
    onError: () => undefined,
  });
  await eventually('the first run', () => (runs === 1 ? true : undefined));
  repeating.wake();
  await eventually('the second run', () => (runs === 2 ? true : undefined));
  await repeating.stop();
});

test('a failure is told and does not end it', async () => {
  const told: unknown[] = [];
  const repeating = repeat({
    everyMs: 1,
    run: () => Promise.reject(new Error(`failure ${told.length}`)),
    onError: (error) => told.push(error),
  });
  await eventually('three failures', () => (told.length >= 3 ? true : undefined));
  await repeating.stop();
  const count = told.length;
  expect(told[0]).toEqual(new Error('failure 0'));
  await pause(50);
  expect(told).toHaveLength(count);
});

test('stopping waits for the run under way', async () => {
  const work = stepwise();
  let isStopped = false;
  const repeating = repeat({ everyMs: never, run: work.run, onError: () => undefined });
  const stopped = repeating.stop().then(() => {
    isStopped = true;
  });
  await Promise.resolve();
  expect(isStopped).toBe(false);
  work.letGo();
  await stopped;
  expect(work.runs()).toBe(1);
});

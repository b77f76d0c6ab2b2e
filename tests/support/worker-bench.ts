import { pino } from 'pino';
import { setTimeout as pause } from 'node:timers/promises';
import { z } from 'zod';
import { buildDeps } from '#server/deps.ts';
import type { Replacements } from '#server/deps.ts';
import { createTestClock } from './test-clock.ts';
import { testConfig } from './test-config.ts';
import { createTestDatabase } from './test-database.ts';

const lineSchema = z.looseObject({ level: z.number(), msg: z.string() });
export type LogLine = z.infer<typeof lineSchema>;

export type WorkerBench = Awaited<ReturnType<typeof createWorkerBench>>;

/** A real, empty database with what services need, and the log as a list of lines. */
export async function createWorkerBench(
  environment: Readonly<Record<string, string>> = {},
  replacements: Replacements = {},
) {
  const testDatabase = await createTestDatabase();
  const clock = createTestClock();
  const lines: LogLine[] = [];
  const log = pino(
    { level: 'debug', base: null },
    {
      write: (line: string) => {
        lines.push(lineSchema.parse(JSON.parse(line)));
      },
    },
  );
  const config = testConfig({ DATABASE_URL: testDatabase.url, ...environment });
  const { deps, database, close } = buildDeps(config, { clock, log, ...replacements });
  return {
    config,
    deps,
    clock,
    log,
    lines,
    database,
    db: database.db,
    ownerUrl: testDatabase.ownerUrl,
    drop: async () => {
      await close();
      await testDatabase.drop();
    },
  };
}

/** Waits until a look gives something; says what was missing when the time is over. */
export async function eventually<Result>(
  what: string,
  look: () => Promise<Result | undefined> | Result | undefined,
  seconds = 30,
): Promise<Result> {
  for (let tenths = 0; tenths < seconds * 10; tenths += 1) {
    const found = await look();
    if (found !== undefined) {
      return found;
    }
    await pause(100);
  }
  throw new Error(`Waited ${seconds} s in vain for ${what}.`);
}

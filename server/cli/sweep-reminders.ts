import { systemClock } from '#server/clock.ts';
import { ConfigError, loadProcessConfig } from '#server/config.ts';
import { buildDeps } from '#server/deps.ts';
import { sweepDueReminders } from '#server/features/reminders/sweep-reminders.service.ts';
import { listSites } from '#server/features/settings/settings.service.ts';
import { createLog } from '#server/log.ts';

const usage =
  'Usage: tsx server/cli/sweep-reminders.ts [--site <code>] [--at <instant>]\n' +
  'Looks for due reminders now, or as if it were another time; the worker sends what is found.\n';

type Wish = { readonly site: string | null; readonly at: Date | null };

function readWish(args: readonly string[]): Wish | null {
  let wish: Wish = { site: null, at: null };
  for (let index = 0; index < args.length; index += 2) {
    const value = args[index + 1];
    const at = new Date(value ?? '');
    if (args[index] === '--site' && value !== undefined) {
      wish = { ...wish, site: value };
    } else if (args[index] === '--at' && !Number.isNaN(at.getTime())) {
      wish = { ...wish, at };
    } else {
      return null;
    }
  }
  return wish;
}

async function sweep({ site: code, at }: Wish): Promise<number> {
  const clock = at === null ? systemClock : { now: () => at };
  const { deps, close } = buildDeps(loadProcessConfig(), { clock, log: createLog('warn') });
  try {
    const sites = (await listSites(deps)).filter((site) => code === null || site.code === code);
    if (sites.length === 0) {
      process.stderr.write(`There is no site ${code ?? ''}.\n`);
      return 2;
    }
    for (const site of sites) {
      const outcome = await sweepDueReminders(deps, site.id);
      process.stdout.write(
        outcome.kind === 'swept'
          ? `${site.name}, ${outcome.day}: ${outcome.digestCount} new digests.\n`
          : `${site.name}: it is not morning there yet.\n`,
      );
    }
    return 0;
  } finally {
    await close();
  }
}

async function main(): Promise<number> {
  const wish = readWish(process.argv.slice(2));
  if (wish === null) {
    process.stderr.write(usage);
    return 2;
  }
  try {
    return await sweep(wish);
  } catch (error) {
    if (error instanceof ConfigError) {
      process.stderr.write(`${error.message}\n`);
      return 2;
    }
    throw error;
  }
}

process.exitCode = await main();

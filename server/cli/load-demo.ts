import { systemClock } from '#server/clock.ts';
import { connectDatabase } from '#server/db/client.ts';
import { isDatabaseUnavailable } from '#server/db/db-errors.ts';
import { defaultDemoSeed } from '#server/demo/build-demo.ts';
import { DemoError, isEmpty, loadDemo } from '#server/demo/load-demo.ts';
import { findOwnerUrl } from './config.ts';

/** `tsx server/cli/load-demo.ts [--force | --if-empty]` with the owner's address in DATABASE_OWNER_URL. */
async function main(args: readonly string[]): Promise<number> {
  const ownerUrl = findOwnerUrl();
  const unknown = args.find((arg) => arg !== '--force' && arg !== '--if-empty');
  if (unknown !== undefined) {
    process.stderr.write(`"${unknown}" is no option: there are --force and --if-empty.\n`);
    return 2;
  }
  if (ownerUrl === undefined || !URL.canParse(ownerUrl)) {
    process.stderr.write(
      'Set DATABASE_OWNER_URL to the postgres:// address of the role that owns the tables.\n',
    );
    return 2;
  }
  const database = connectDatabase({ url: ownerUrl, maxConnections: 1 });
  try {
    if (args.includes('--if-empty') && !(await isEmpty(database.db))) {
      return 0;
    }
    const counts = await loadDemo(database, {
      seed: defaultDemoSeed,
      nowMs: systemClock.now().getTime(),
      force: args.includes('--force'),
    });
    process.stdout.write(
      `Loaded Larkfen Cells: ${counts.instruments} instruments with ${counts.units} units, ${counts.cells} cells, ${counts.pastBookings} past and ${counts.futureBookings} current or future bookings, ${counts.openRequests} open requests.\n`,
    );
    return 0;
  } catch (error) {
    if (error instanceof DemoError) {
      process.stderr.write(`${error.message}\n`);
      return 1;
    }
    if (isDatabaseUnavailable(error)) {
      process.stderr.write(
        `The database server at ${new URL(ownerUrl).host} does not answer: start it and load the demo again.\n`,
      );
      return 1;
    }
    throw error;
  } finally {
    await database.close();
  }
}

process.exitCode = await main(process.argv.slice(2));

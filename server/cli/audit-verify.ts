import { connectDatabase } from '#server/db/client.ts';
import { isDatabaseUnavailable } from '#server/db/db-errors.ts';
import { verifyTrail } from '#server/features/audit/seal-trail.service.ts';
import type { NotedHead, TrailVerdict } from '#server/features/audit/seal-trail.service.ts';
import { findDatabaseUrl } from './config.ts';

const usage =
  'Usage: tsx server/cli/audit-verify.ts [--head <number>:<hash>] with DATABASE_URL set.\n' +
  '--head takes the last line of an earlier run and proves that the trail still holds it.\n';

function readHead(args: readonly string[]): NotedHead | null | 'unreadable' {
  if (args.length === 0) {
    return null;
  }
  const match = /^(\d{1,15}):([0-9a-f]{64})$/.exec(args[1] ?? '');
  if (args[0] !== '--head' || args.length !== 2 || match === null) {
    return 'unreadable';
  }
  return { sealNo: Number(match[1]), hash: match[2] ?? '' };
}

function report(verdict: TrailVerdict): string {
  const { verifiedCount, headHash, firstBreak, unsealedCount, oldestUnsealedAt } = verdict;
  const since =
    oldestUnsealedAt === null ? '' : `, the oldest of ${oldestUnsealedAt.toISOString()}`;
  const broken =
    firstBreak === null
      ? 'No break.'
      : `First break at number ${firstBreak.sealNo}${firstBreak.eventId === null ? '' : ` (event ${firstBreak.eventId})`}: ${firstBreak.reason}.`;
  return [
    `Verified ${verifiedCount} sealed events.`,
    broken,
    `Not yet sealed: ${unsealedCount}${since}.`,
    `Head ${verifiedCount}:${headHash}`,
    '',
  ].join('\n');
}

/** 0 where the trail is whole, 1 where it is not, 2 where that could not be told. */
async function main(): Promise<number> {
  const noted = readHead(process.argv.slice(2));
  const url = findDatabaseUrl();
  if (noted === 'unreadable' || url === undefined || !URL.canParse(url)) {
    process.stderr.write(usage);
    return 2;
  }
  const database = connectDatabase({ url, maxConnections: 1 });
  try {
    const verdict = await verifyTrail(database, noted);
    process.stdout.write(report(verdict));
    return verdict.firstBreak === null ? 0 : 1;
  } catch (error) {
    if (isDatabaseUnavailable(error)) {
      process.stderr.write('The database does not answer: start it, or correct DATABASE_URL.\n');
      return 2;
    }
    throw error;
  } finally {
    await database.close();
  }
}

process.exitCode = await main();

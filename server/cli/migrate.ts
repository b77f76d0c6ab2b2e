import { MigrationError, migrateDatabase } from '#server/db/migrate-database.ts';
import { findOwnerUrl } from './config.ts';

/** `tsx server/cli/migrate.ts` with the owner's address in DATABASE_OWNER_URL. */
async function main(): Promise<number> {
  const ownerUrl = findOwnerUrl();
  if (ownerUrl === undefined || !URL.canParse(ownerUrl)) {
    process.stderr.write(
      'Set DATABASE_OWNER_URL to the postgres:// address of the role that owns the tables.\n',
    );
    return 2;
  }
  try {
    const { appliedCount } = await migrateDatabase(ownerUrl);
    process.stdout.write(
      appliedCount === 0
        ? 'The database is up to date.\n'
        : `Applied ${appliedCount} migrations; the database is up to date.\n`,
    );
    return 0;
  } catch (error) {
    if (error instanceof MigrationError) {
      process.stderr.write(`${error.message}\n`);
      return 1;
    }
    throw error;
  }
}

process.exitCode = await main();

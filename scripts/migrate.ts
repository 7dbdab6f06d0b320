/** `node --import tsx scripts/migrate.ts`: brings the database to this release's schema. */
import { migrate } from '../server/db/migrator.ts';

const ownerUrl = process.env.MIGRATIONS_DATABASE_URL ?? process.env.DATABASE_URL;
if (!ownerUrl) {
  console.error('Set MIGRATIONS_DATABASE_URL (or DATABASE_URL) to the address of the database to migrate.');
  process.exit(2);
}

try {
  const ran = await migrate({ ownerUrl });
  console.log(
    ran.length === 0
      ? 'The database is up to date.'
      : `The database is up to date: ${ran.length} migrations run.`,
  );
} catch (error) {
  console.error(
    `The database could not be migrated. ${error instanceof Error ? error.message : String(error)}`,
  );
  process.exitCode = 1;
}

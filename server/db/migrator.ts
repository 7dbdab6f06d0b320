/**
 * Brings a database to the schema this code knows. Every run holds one advisory lock on one connection, so
 * that several servers may start at once; each migration and its entry in `migrations` commit together.
 */
import pg, { type Client } from 'pg';
import { Umzug, type UmzugStorage } from 'umzug';
import { grantToApplication, revokeFromApplication } from './grants.ts';
import { migrations } from './migrations/all.ts';

/** Any fixed number does; it only has to differ from the other advisory locks of this database. */
const MIGRATION_LOCK = 732_015_001;

/** The database has been migrated by a newer release; running this one could damage its data. */
export class DatabaseNewerThanCodeError extends Error {
  override readonly name = 'DatabaseNewerThanCodeError';
  readonly unknownMigrations: readonly string[];

  constructor(unknownMigrations: readonly string[]) {
    super(
      `The database holds migrations this release does not know: ${unknownMigrations.join(', ')}. ` +
        'Run the release that made them, or a newer one.',
    );
    this.unknownMigrations = unknownMigrations;
  }
}

interface MigrateOptions {
  /** Address with the role that owns the tables. */
  ownerUrl: string;
  /** Role that runs the server; when it does not exist, nothing is granted. */
  appRole?: string;
}

/** Runs what is pending and grants the server its rights. Answers the names of the migrations run. */
export async function migrate({ ownerUrl, appRole = 'saltmark_app' }: MigrateOptions): Promise<string[]> {
  return underLock(ownerUrl, async (client) => {
    const done = await umzugOn(client).up();
    await grantToApplication(client, appRole);
    return done.map(({ name }) => name);
  });
}

/** Undoes every migration, newest first, and with them all data. For tests and throw-away databases. */
export async function revertAllMigrations({
  ownerUrl,
  appRole = 'saltmark_app',
}: MigrateOptions): Promise<string[]> {
  return underLock(ownerUrl, async (client) => {
    const undone = await umzugOn(client).down({ to: 0 });
    await revokeFromApplication(client, appRole);
    await client.query('drop table migrations');
    return undone.map(({ name }) => name);
  });
}

/** Names of the migrations this database still needs, oldest first. Changes nothing; the server's role may ask. */
export async function pendingMigrations(url: string): Promise<string[]> {
  return onClient(url, async (client) => {
    const { rows } = await client.query<{ isThere: boolean }>(
      `select to_regclass('public.migrations') is not null as "isThere"`,
    );
    const known = migrations.map(({ name }) => name);
    if (!rows[0]?.isThere) return known;
    const executed = new Set(await executedMigrations(client));
    refuseNewerDatabase(executed);
    return known.filter((name) => !executed.has(name));
  });
}

async function onClient<T>(url: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: url, application_name: 'saltmark migrations' });
  // Told by the query that fails as well; without a listener it would end the process.
  client.on('error', () => {});
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** The lock belongs to the connection and ends with it, also when the process is killed. */
async function underLock<T>(ownerUrl: string, work: (client: Client) => Promise<T>): Promise<T> {
  return onClient(ownerUrl, async (client) => {
    await client.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await client.query('set search_path to public');
    await client.query(`
      set client_min_messages to warning;
      create table if not exists migrations (name text primary key, ran_at timestamptz not null default now())
    `);
    refuseNewerDatabase(await executedMigrations(client));
    return work(client);
  });
}

async function executedMigrations(client: Client): Promise<string[]> {
  const { rows } = await client.query<{ name: string }>('select name from public.migrations order by name');
  return rows.map(({ name }) => name);
}

function refuseNewerDatabase(executed: Iterable<string>): void {
  const known = new Set(migrations.map(({ name }) => name));
  const unknown = [...executed].filter((name) => !known.has(name));
  if (unknown.length > 0) throw new DatabaseNewerThanCodeError(unknown);
}

function umzugOn(client: Client): Umzug<Client> {
  return new Umzug({
    context: client,
    storage: readOnlyStorage,
    logger: undefined,
    migrations: migrations.map(({ name, up, down }) => ({
      name,
      up: () =>
        inOneTransaction(client, up, { text: 'insert into migrations (name) values ($1)', values: [name] }),
      down: () =>
        inOneTransaction(client, down, { text: 'delete from migrations where name = $1', values: [name] }),
    })),
  });
}

/** Umzug would log after the migration's own commit; a crash in between would run it twice. */
const readOnlyStorage: UmzugStorage<Client> = {
  executed: ({ context }) => executedMigrations(context),
  logMigration: async () => {},
  unlogMigration: async () => {},
};

async function inOneTransaction(
  client: Client,
  change: string,
  entry: { text: string; values: string[] },
): Promise<void> {
  await client.query('begin');
  try {
    await client.query(change);
    await client.query(entry);
    await client.query('commit');
  } catch (error) {
    await client.query('rollback');
    throw error;
  }
}

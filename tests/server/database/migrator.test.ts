import pg from 'pg';
import { afterEach, beforeEach, expect, it } from 'vitest';
import {
  DatabaseNewerThanCodeError,
  migrate,
  pendingMigrations,
  revertAllMigrations,
} from '../../../server/db/migrator.ts';
import { migrations } from '../../../server/db/migrations/all.ts';
import { freshDatabase, type TestDatabase } from '../../support/database.ts';

let database: TestDatabase;
let client: pg.Client;

beforeEach(async () => {
  database = await freshDatabase({ migrated: false });
  client = new pg.Client({ connectionString: database.ownerUrl });
  await client.connect();
});
afterEach(async () => {
  await client.end();
  await database.drop();
});

const names = migrations.map(({ name }) => name);

/** Tables, sequences, functions and default rights; what the btree_gist extension brings is not ours. */
async function objectsOfTheSchema(): Promise<string[]> {
  const { rows } = await client.query<{ name: string }>(
    `select relname as name from pg_class where relnamespace = 'public'::regnamespace
     union all
     select proname from pg_proc p where pronamespace = 'public'::regnamespace
       and not exists (select from pg_depend d where d.objid = p.oid and d.deptype = 'e')
     union all
     select defaclobjtype::text from pg_default_acl`,
  );
  return rows.map(({ name }) => name);
}

it('names each migration after its file time and keeps them in order, each once', () => {
  expect(names).toEqual([...new Set(names)].toSorted());
  expect(names.filter((name) => !/^\d{14}-[a-z]+(-[a-z]+)+$/.test(name))).toEqual([]);
});

it('runs every migration once, in order, and then has nothing to do', async () => {
  await expect(pendingMigrations(database.ownerUrl)).resolves.toEqual(names);
  await expect(migrate(database)).resolves.toEqual(names);
  await expect(pendingMigrations(database.appUrl)).resolves.toEqual([]);
  await expect(migrate(database)).resolves.toEqual([]);
});

it('lets two servers start at once: one migrates, the other waits and finds it done', async () => {
  const [first, second] = await Promise.all([migrate(database), migrate(database)]);
  expect([...first, ...second]).toEqual(names);
  const { rows } = await client.query<{ name: string }>('select name from migrations order by name');
  expect(rows.map(({ name }) => name)).toEqual(names);
});

it('refuses a database that a newer release has migrated, and says which migrations it means', async () => {
  await migrate(database);
  await client.query(`insert into migrations (name) values ('29990101000000-add-tomorrow')`);
  for (const attempt of [() => migrate(database), () => pendingMigrations(database.appUrl)]) {
    const error: unknown = await attempt().catch((reason: unknown) => reason);
    expect(error).toBeInstanceOf(DatabaseNewerThanCodeError);
    expect((error as Error).message).toContain('29990101000000-add-tomorrow');
  }
});

it('leaves nothing of a migration that fails, and goes on from there later', async () => {
  await client.query('create table standards (in_the_way integer)');
  await expect(migrate(database)).rejects.toThrow('already exists');
  const { rows } = await client.query<{ name: string }>(
    'select name from migrations order by name desc limit 1',
  );
  expect(rows[0]!.name).toMatch(/-create-devices$/);
  await client.query('drop table standards');
  await expect(migrate(database)).resolves.toHaveLength(names.length - 8);
});

it('goes all the way back to an empty schema', async () => {
  await migrate(database);
  await expect(revertAllMigrations(database)).resolves.toEqual(names.toReversed());
  await expect(objectsOfTheSchema()).resolves.toEqual([]);
  await expect(migrate(database)).resolves.toEqual(names);
});

it('serves a database with one role: there is nobody to grant rights to', async () => {
  await expect(migrate({ ownerUrl: database.ownerUrl, appRole: 'nobody_of_that_name' })).resolves.toEqual(
    names,
  );
  const { rows } = await client.query('select ensure_reading_partitions(0, 0)');
  expect(rows).toHaveLength(1);
});

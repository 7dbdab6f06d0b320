import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freshDatabase, type TestDatabase } from '../../support/database.ts';
import { insertAuditEvent, insertPlant } from './rows.ts';

let database: TestDatabase;
let owner: pg.Client;
let application: pg.Client;
let superuser: pg.Client;

const connect = async (url: string) => {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  return client;
};

beforeAll(async () => {
  database = await freshDatabase();
  owner = await connect(database.ownerUrl);
  application = await connect(database.appUrl);
  superuser = await connect(database.superuserUrl);
  await insertPlant(application);
  await insertAuditEvent(application);
});
afterAll(async () => {
  for (const client of [owner, application, superuser]) await client.end();
  await database.drop();
});

const changes = [
  `update audit_events set actor_name = 'somebody else'`,
  'update audit_events set reason = null where false',
  'delete from audit_events',
  'truncate audit_events',
];

describe('the audit trail', () => {
  it.each(changes)('the application has no right to: %s', async (change) => {
    await expect(application.query(change)).rejects.toThrow('permission denied for table audit_events');
  });

  it.each(changes)('the owner of the tables is refused by the trigger: %s', async (change) => {
    await expect(owner.query(change)).rejects.toThrow(
      /^audit_events is append-only: (update|delete|truncate) refused$/,
    );
  });

  it('a superuser in replica mode, which silences ordinary triggers, is refused too', async () => {
    await superuser.query('set session_replication_role = replica');
    await expect(superuser.query('delete from audit_events')).rejects.toThrow('append-only');
  });

  it('refuses a second event after the same one: the chain cannot fork', async () => {
    await expect(
      application.query(
        `insert into audit_events (sequence, captured_at, received_at, actor_kind, actor_name, action, object_kind,
           previous_hash, hash) values (2, now(), now(), 'system', 'x', 'x', 'x', $1, $2)`,
        ['0'.repeat(64), 'f'.repeat(64)],
      ),
    ).rejects.toMatchObject({ constraint: 'audit_events_previous_hash_key' });
  });

  it('still holds what was written', async () => {
    const { rows } = await application.query('select actor_name from audit_events');
    expect(rows).toEqual([{ actor_name: 'migrations' }]);
  });
});

describe('the rest of the database', () => {
  it('gives the application the four rights on working tables, also on those made later', async () => {
    await owner.query(
      'create table made_later (id integer generated always as identity primary key, word text)',
    );
    await application.query(`insert into made_later (word) values ('salt')`);
    await application.query(`update made_later set word = 'brine'`);
    const { rows } = await application.query('delete from made_later returning word');
    expect(rows).toEqual([{ word: 'brine' }]);
  });

  it.each(['certificates', 'calibration_steps', 'captures', 'capture_exclusions', 'signatures'])(
    'keeps every row of %s, whoever asks',
    async (table) => {
      await expect(application.query(`delete from ${table}`)).rejects.toThrow('permission denied');
      await expect(application.query(`truncate ${table}`)).rejects.toThrow('permission denied');
      await expect(owner.query(`delete from ${table}`)).rejects.toThrow('append-only');
    },
  );

  it.each(['cell_constants', 'probe_events'])(
    'lets the application add to %s, never change it',
    async (table) => {
      await expect(application.query(`delete from ${table}`)).rejects.toThrow('permission denied');
      await expect(application.query(`update ${table} set user_id = null`)).rejects.toThrow(
        'permission denied',
      );
    },
  );

  it.each([
    'create table sneaky (id integer)',
    'drop table mails',
    `insert into migrations (name) values ('x')`,
  ])('refuses the application: %s', async (statement) => {
    await expect(application.query(statement)).rejects.toMatchObject({ code: '42501' });
  });
});

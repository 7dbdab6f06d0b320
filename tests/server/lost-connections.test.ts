import { afterAll, beforeAll, expect, it } from 'vitest';
import pg from 'pg';
import { openPool } from '../../server/lib/pool.ts';
import { freshDatabase, type TestDatabase } from '../support/database.ts';

let db: TestDatabase;
beforeAll(async () => {
  db = await freshDatabase({ migrated: false });
});
afterAll(() => db.drop());

/** Ends every connection of that name, as a restart of the database does. */
async function endConnections(name: string): Promise<void> {
  const client = new pg.Client({ connectionString: db.superuserUrl });
  await client.connect();
  await client.query('select pg_terminate_backend(pid) from pg_stat_activity where application_name = $1', [
    name,
  ]);
  await client.end();
}

it('a connection that ends while somebody has it fails the next query, is told of, and the pool goes on', async () => {
  const lost: string[] = [];
  const name = 'lost-connections test';
  const pool = openPool({ connectionString: db.appUrl, application_name: name, max: 1 }, ({ message }) =>
    lost.push(message),
  );
  const client = await pool.connect();
  await client.query('select 1');
  await endConnections(name);
  await expect(client.query('select 1')).rejects.toThrow();
  client.release(true);
  expect(lost.length).toBeGreaterThan(0);
  const { rows } = await pool.query<{ one: number }>('select 1 as one');
  expect(rows).toEqual([{ one: 1 }]);
  await pool.end();
});

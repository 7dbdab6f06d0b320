import pg from 'pg';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { freshDatabase, type TestDatabase } from '../../support/database.ts';

let database: TestDatabase;
let application: pg.Client;

beforeAll(async () => {
  database = await freshDatabase();
  application = new pg.Client({ connectionString: database.appUrl });
  await application.connect();
});
afterAll(async () => {
  await application.end();
  await database.drop();
});
beforeEach(() => application.query('delete from readings'));

const insertReading = (at: Date, n: number) =>
  application.query(
    `insert into readings (at, device_id, boot_id, n, probe_id, received_at, context, conductivity_us_cm, quality)
     values ($1, 1, 1, $2, 1, now(), 'process', 1408.2, 'good') on conflict do nothing`,
    [at, n],
  );

const ensurePartitions = async (monthsBack: number, monthsAhead: number): Promise<string[]> => {
  const { rows } = await application.query<{ name: string }>(
    'select ensure_reading_partitions($1, $2) as name',
    [monthsBack, monthsAhead],
  );
  return rows.map(({ name }) => name);
};

const whereStored = async (): Promise<Record<string, string>> => {
  const { rows } = await application.query<{ n: string; partition: string }>(
    'select n, tableoid::regclass::text as partition from readings order by n',
  );
  return Object.fromEntries(rows.map(({ n, partition }) => [n, partition]));
};

/** The first instant of a month relative to the current one, in UTC. */
const monthStart = (offset: number): Date => {
  const now = new Date();
  return new Date(Date.UTC(now.getUTCFullYear(), now.getUTCMonth() + offset, 1));
};
const partitionOf = (offset: number): string =>
  `readings_${monthStart(offset).toISOString().slice(0, 7).replace('-', '_')}`;

it('creates the months asked for, ahead of time, and only those missing', async () => {
  await expect(ensurePartitions(0, 2)).resolves.toEqual([0, 1, 2].map(partitionOf));
  await expect(ensurePartitions(0, 3)).resolves.toEqual([partitionOf(3)]);
  await expect(ensurePartitions(0, 3)).resolves.toEqual([]);
  await insertReading(monthStart(2), 1);
  await insertReading(new Date(monthStart(2).getTime() - 1), 2);
  await expect(whereStored()).resolves.toEqual({ 1: partitionOf(2), 2: partitionOf(1) });
});

it('loses no reading of a month without a partition, and moves it when the month is made', async () => {
  await insertReading(monthStart(-6), 1);
  await insertReading(new Date(monthStart(-5).getTime() - 1), 2);
  await insertReading(monthStart(-9), 3);
  await expect(whereStored()).resolves.toEqual({
    1: 'readings_other',
    2: 'readings_other',
    3: 'readings_other',
  });
  await ensurePartitions(6, 0);
  await expect(whereStored()).resolves.toEqual({
    1: partitionOf(-6),
    2: partitionOf(-6),
    3: 'readings_other',
  });
});

it('stores a repeated reading once, before and after its month is made', async () => {
  await insertReading(monthStart(-12), 1);
  await ensurePartitions(12, 0);
  const again = await insertReading(monthStart(-12), 1);
  expect(again.rowCount).toBe(0);
});

it('lets two servers ask at once', async () => {
  const second = new pg.Client({ connectionString: database.appUrl });
  await second.connect();
  const [first] = await Promise.all([
    ensurePartitions(24, 0),
    second.query('select ensure_reading_partitions(24, 0)'),
  ]);
  await second.end();
  const { rows } = await application.query(`select to_regclass('readings_other') as other`);
  expect(rows).toEqual([{ other: 'readings_other' }]);
  await expect(ensurePartitions(24, 0)).resolves.toEqual([]);
  expect(new Set(first).size).toBe(first.length);
});

it('loses no reading and stops no writer while months are made under load', async () => {
  const writer = new pg.Client({ connectionString: database.appUrl });
  await writer.connect();
  let isMaking = true;
  let written = 0;
  const writeOn = async () => {
    do {
      const from = written;
      written += 200;
      // Days 1 to 28 of each of the months -36 to -30, over and over.
      await writer.query(
        `insert into readings (at, device_id, boot_id, n, probe_id, received_at, context, quality)
         select date_trunc('month', now()) - make_interval(months => 30 + (n % 7)) + make_interval(days => n % 28),
           2, 1, n, 2, now(), 'process', 'good' from generate_series($1::int, $2::int) n`,
        [from, written - 1],
      );
    } while (isMaking);
  };
  const writing = writeOn();
  await ensurePartitions(40, 0).finally(() => {
    isMaking = false;
  });
  await writing;
  await writer.end();
  const { rows } = await application.query<{ stored: string; left: string }>(
    `select count(*) as stored, count(*) filter (where tableoid = 'readings_other'::regclass) as left
     from readings where device_id = 2`,
  );
  expect(rows).toEqual([{ stored: String(written), left: '0' }]);
});

it('refuses a span nobody needs', async () => {
  await expect(ensurePartitions(241, 0)).rejects.toThrow('Ask for 0 to 240 months back');
});

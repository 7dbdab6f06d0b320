/** An acknowledgement means: it is in the database. These tests hold, break and flood the database to see that it does. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aMessage, aReading, at, closed, eventually, publish, startPlant, type Plant } from './plant.ts';

let plant: Plant;

beforeAll(async () => {
  plant = await startPlant();
});
afterAll(() => plant.stop());

const countOf = async (deviceId: number): Promise<number> => {
  const [row] = await plant.rows<{ count: number }>('select count(*) from readings where device_id = $1', [
    deviceId,
  ]);
  return Number(row?.count);
};

/** Holds every insert into readings until released. */
async function holdReadings(): Promise<() => Promise<void>> {
  const holder = await plant.pool.connect();
  await holder.query('begin; lock table readings in share row exclusive mode');
  return async () => {
    await holder.query('rollback');
    holder.release();
  };
}
const insertsWaiting = async (): Promise<number> => {
  const rows = await plant.rows(
    `select 1 from pg_stat_activity where application_name = 'saltmark ingest' and wait_event_type = 'Lock'`,
  );
  return rows.length;
};

describe('the acknowledgement', () => {
  it('comes only after the commit', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(1)]));
    const release = await holdReadings();
    let isAcknowledged = false;
    const sent = publish(client, station.name, 'readings', aMessage([aReading(2)])).then(
      () => (isAcknowledged = true),
    );
    await eventually(async () => expect(await insertsWaiting()).toBe(1));
    // A whole exchange with the broker passes, and the publish before it is still not acknowledged.
    await client.subscribeAsync(`saltmark/1/${station.name}/command`, { qos: 1 });
    expect(isAcknowledged).toBe(false);
    expect(await countOf(station.device.id)).toBe(1);
    await release();
    await sent;
    expect(await countOf(station.device.id)).toBe(2);
  });

  it('of thousands of publishes by fifty devices: every one stored exactly once', async () => {
    const stations = await Promise.all(Array.from({ length: 50 }, () => plant.station()));
    const clients = await Promise.all(stations.map((station) => plant.connect(station)));
    const perDevice = 100;
    let acknowledged = 0;
    await Promise.all(
      clients.flatMap((client, index) =>
        Array.from({ length: perDevice }, async (_, n) => {
          await publish(client, stations[index]!.name, 'readings', aMessage([aReading(n)]));
          acknowledged += 1;
        }),
      ),
    );
    expect(acknowledged).toBe(50 * perDevice);
    const [row] = await plant.rows<{ stored: number; keys: number }>(
      `select count(*) as stored, count(distinct (device_id, boot_id, n)) as keys from readings where device_id = any($1)`,
      [stations.map(({ device }) => device.id)],
    );
    expect({ stored: Number(row?.stored), keys: Number(row?.keys) }).toEqual({ stored: 5000, keys: 5000 });
    const live = await plant.rows('select n from live_readings where probe_id = any($1)', [
      stations.map(({ probe }) => probe.id),
    ]);
    expect(live.every(({ n }) => Number(n) === perDevice - 1)).toBe(true);
  });
});

describe('a database in trouble', () => {
  /** All connections of ingest end, and no new one is let in. */
  const stopDatabase = async (): Promise<void> => {
    await plant.rows(`alter database ${plant.db.name} with connection limit 0`);
    await plant.rows(
      `select pg_terminate_backend(pid) from pg_stat_activity where application_name like 'saltmark ingest%'`,
    );
  };
  const startDatabase = (): Promise<unknown> =>
    plant.rows(`alter database ${plant.db.name} with connection limit -1`);

  it('holds what comes, refuses newcomers, says so, and stores all of it when it is back', async () => {
    const station = await plant.station();
    const newcomer = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(0)]));
    await stopDatabase();
    let acknowledged = 0;
    const sent = Array.from({ length: 30 }, async (_, n) => {
      await publish(client, station.name, 'readings', aMessage([aReading(1 + n)]));
      acknowledged += 1;
    });
    const health = plant.parts.health.find(({ name }) => name === 'broker');
    await eventually(async () => expect(await health?.check()).toMatchObject({ up: false }));
    await expect(plant.connect(newcomer)).rejects.toThrow(/Server unavailable/);
    expect(acknowledged).toBe(0);
    await startDatabase();
    await Promise.all(sent);
    expect(await countOf(station.device.id)).toBe(31);
    expect(await health?.check()).toMatchObject({ up: true });
    await plant.connect(newcomer);
  });

  it('forgets no change of credentials that happened meanwhile', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await plant.rows(
      `select pg_terminate_backend(pid) from pg_stat_activity where application_name = 'saltmark ingest directory'`,
    );
    await plant.rows('update devices set revoked_at = now() where id = $1', [station.device.id]);
    await closed(client);
    await expect(plant.connect(station)).rejects.toThrow(/Connection refused/);
  });
});

describe('more than the database takes', () => {
  it('is held up to a limit; beyond it devices keep their messages and send them again', async () => {
    await plant.restartIngest({ maxWaitingBytes: 200_000, maxGroupWeight: 50 });
    const stations = await Promise.all(Array.from({ length: 10 }, () => plant.station()));
    const reconnecting = { reconnectPeriod: 50, reconnectOnConnackError: true };
    const clients = await Promise.all(stations.map((station) => plant.connect(station, reconnecting)));
    const release = await holdReadings();
    // Each device keeps 60 messages of its own and repeats them until they are acknowledged, as real ones do.
    const sent = clients.flatMap((client, index) =>
      Array.from({ length: 60 }, (_, n) =>
        publish(client, stations[index]!.name, 'readings', aMessage([aReading(n)])),
      ),
    );
    const seen: number[] = [];
    await eventually(() => {
      seen.push(plant.ingest.waiting().bytes);
      expect(seen.at(-1)).toBeGreaterThan(150_000);
    });
    expect(Math.max(...seen)).toBeLessThanOrEqual(200_000);
    await release();
    await Promise.all(sent);
    expect(plant.ingest.waiting()).toEqual({ items: 0, bytes: 0 });
    const [row] = await plant.rows<{ stored: number; keys: number }>(
      `select count(*) as stored, count(distinct (device_id, boot_id, n)) as keys from readings where device_id = any($1)`,
      [stations.map(({ device }) => device.id)],
    );
    expect({ stored: Number(row?.stored), keys: Number(row?.keys) }).toEqual({ stored: 600, keys: 600 });
    await plant.restartIngest();
  });
});

describe('stopping', () => {
  it('commits what it has taken, and what it has not taken stays with the device', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    const sent = Array.from({ length: 200 }, (_, n) =>
      publish(client, station.name, 'readings', aMessage([aReading(n, { at: at(-5) })])).then(
        () => n,
        () => null,
      ),
    );
    await plant.restartIngest();
    await client.endAsync(true);
    const acknowledged = (await Promise.all(sent)).filter((n) => n !== null);
    const stored = await plant.rows<{ n: number }>('select n from readings where device_id = $1', [
      station.device.id,
    ]);
    const numbers = stored.map(({ n }) => Number(n));
    expect(numbers).toEqual(expect.arrayContaining(acknowledged));
    expect(new Set(numbers).size).toBe(numbers.length);
  });
});

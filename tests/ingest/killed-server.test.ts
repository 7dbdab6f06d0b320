/**
 * The server is killed under load, twice: every reading that a device was told is kept must be in the database, exactly
 * once and unchanged. What dies is the server; PostgreSQL lives on, so this shows that nothing is acknowledged before
 * its commit. A power cut of the database machine is PostgreSQL's own promise (fsync, on in every cluster we start for
 * data); the cluster for tests runs without fsync, and commits here wait for their log as they would with it.
 */
import { connect, type MqttClient } from 'mqtt';
import pg from 'pg';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { topicOf } from '../../shared/contracts/mqtt.ts';
import { User } from '../../server/db/models/index.ts';
import { connectDatabase } from '../../server/db/sequelize.ts';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { freshDatabase, type TestDatabase } from '../support/database.ts';
import { aDevice, aPoint, aProbe, aSite, installed } from '../support/rows.ts';
import { serverProcess, type ServerProcess } from '../support/server-process.ts';

const deviceCount = 20;
/** Publishes a device keeps unanswered, and readings in each. */
const windowSize = 4;
const perMessage = 5;
const secret = 'a-secret-that-only-this-device-has';
const boot = '01JE6M0T6Y';

interface SentReading {
  n: number;
  at: string;
  conductivity_us_cm: number;
  temperature_c: number;
}

/** A device that numbers its readings, sends each until it is acknowledged, and remembers both. */
interface Sender {
  name: string;
  sent: SentReading[];
  acknowledged: Set<number>;
  /** Sends no more and waits until all is acknowledged. */
  stop: () => Promise<void>;
  /** Ends the connection, whatever is unanswered. */
  abandon: () => void;
}

let db: TestDatabase;
let pool: pg.Pool;
let server: ServerProcess;
const senders: Sender[] = [];

beforeAll(async () => {
  db = await freshDatabase();
  pool = new pg.Pool({ connectionString: db.superuserUrl, max: 2 });
  pool.on('error', () => {});
  await pool.query(`alter database ${db.name} set synchronous_commit = on`);
  const names = await registerDevices();
  server = await serverProcess(db.appUrl);
  await server.start();
  senders.push(...names.map((name, index) => startSender(name, index)));
}, 120_000);
afterAll(async () => {
  for (const sender of senders) sender.abandon();
  await server?.stop();
  await pool.end();
  await db.drop();
}, 60_000);

async function registerDevices(): Promise<string[]> {
  const sequelize = connectDatabase(db.appUrl, { maxConnections: 2, applicationName: 'tests' });
  const nobody = {
    passwordHash: null,
    lockedUntil: null,
    passwordChangedAt: null,
    lastSignInAt: null,
    deactivatedAt: null,
  };
  const installer = await User.create({ email: 'installer@plant.example', name: 'Installer', ...nobody });
  const site = await aSite();
  const names: string[] = [];
  for (let index = 0; index < deviceCount; index += 1) {
    const probe = await aProbe(site.id);
    await installed(probe, await aPoint(site.id), installer.id);
    const unborn = { bootText: null, isOnline: false, onlineWhy: null, lastSeenAt: null, settingsHash: null };
    const device = await aDevice(probe.id, { secretHash: hashDeviceSecret(secret), ...unborn });
    names.push(device.name);
  }
  await sequelize.close();
  return names;
}

function startSender(name: string, index: number): Sender {
  const client: MqttClient = connect(server.mqttUrl, {
    clientId: name,
    username: name,
    password: secret,
    reconnectPeriod: 100 + index * 10,
    connectTimeout: 10_000,
    reconnectOnConnackError: true,
  });
  // A server that is away is tried again; that is what this test is about.
  client.on('error', () => {});
  const sent: SentReading[] = [];
  const acknowledged = new Set<number>();
  let isStopping = false;

  const nextMessage = (): SentReading[] =>
    Array.from({ length: perMessage }, () => {
      const n = sent.length;
      const reading = {
        n,
        at: new Date().toISOString(),
        conductivity_us_cm: 1000 + index * 100 + n / 1024,
        temperature_c: 10 + (n % 64) / 64,
      };
      sent.push(reading);
      return reading;
    });
  const lane = async (): Promise<void> => {
    while (!isStopping) {
      const readings = nextMessage();
      const more = { context: 'process', conductance_us: null, solution: null, quality: 'good', flags: [] };
      const body = {
        v: 1,
        boot,
        sent: new Date().toISOString(),
        readings: readings.map((one) => ({ ...one, ...more })),
      };
      await client.publishAsync(topicOf(name, 'readings'), JSON.stringify(body), { qos: 1 });
      for (const { n } of readings) acknowledged.add(n);
    }
  };
  const lanes = Promise.all(Array.from({ length: windowSize }, lane));
  return {
    name,
    sent,
    acknowledged,
    stop: async () => {
      isStopping = true;
      await lanes;
      await client.endAsync(true);
    },
    abandon: () => {
      isStopping = true;
      lanes.catch(() => {});
      client.end(true);
    },
  };
}

interface StoredReading extends SentReading {
  device: string;
  boot: string;
}

/** Everything stored, by device and number; fails when a reading stands there twice. */
async function readStored(): Promise<Map<string, StoredReading>> {
  const { rows } = await pool.query<Omit<StoredReading, 'at'> & { at: Date }>(
    `select d.name as device, b.boot, r.n::float8 as n, r.at, r.conductivity_us_cm, r.temperature_c
       from readings r join devices d on d.id = r.device_id join device_boots b on b.id = r.boot_id`,
  );
  const stored = new Map(rows.map((row) => [`${row.device}/${row.n}`, { ...row, at: row.at.toISOString() }]));
  expect(stored.size, 'A reading is stored twice.').toBe(rows.length);
  return stored;
}

/** Names the readings that are missing or were changed; `of` chooses which must be there. */
function lostOrChanged(
  stored: Map<string, StoredReading>,
  of: (sender: Sender) => Iterable<number>,
): string[] {
  return senders.flatMap((sender) =>
    [...of(sender)].flatMap((n) => {
      const row = stored.get(`${sender.name}/${n}`);
      const sent = sender.sent[n]!;
      const isSame =
        row?.boot === boot &&
        row.at === sent.at &&
        row.conductivity_us_cm === sent.conductivity_us_cm &&
        row.temperature_c === sent.temperature_c;
      return isSame ? [] : [`${sender.name} ${n}: ${row ? 'changed' : 'missing'}`];
    }),
  );
}

const acknowledgedSoFar = (): number => senders.reduce((sum, { acknowledged }) => sum + acknowledged.size, 0);
const unanswered = (): number =>
  senders.reduce((sum, { sent, acknowledged }) => sum + sent.length - acknowledged.size, 0);

/** Every device goes on: each has so many more readings acknowledged than when this was called. */
async function everyDeviceAdvances(readings: number): Promise<void> {
  const before = senders.map(({ acknowledged }) => acknowledged.size);
  await vi.waitFor(
    () => {
      const behind = senders.filter(
        ({ acknowledged }, index) => acknowledged.size < before[index]! + readings,
      );
      if (behind.length > 0) throw new Error(`${behind.length} devices wait for acknowledgements.`);
    },
    { timeout: 60_000, interval: 5 },
  );
}

it(
  'every acknowledged reading survives the kill, exactly once and unchanged',
  { timeout: 240_000 },
  async () => {
    for (let round = 0; round < 2; round += 1) {
      await everyDeviceAdvances(10 * perMessage);
      await server.kill();
      // All that was acknowledged is known here before the server is there again.
      expect(unanswered(), 'The kill came while nothing was on its way.').toBeGreaterThan(0);
      const acknowledged = senders.map((sender) => new Set(sender.acknowledged));
      const stored = await readStored();
      expect(lostOrChanged(stored, (sender) => acknowledged[senders.indexOf(sender)]!)).toEqual([]);
      await server.start();
    }
    await everyDeviceAdvances(2 * perMessage);
    await Promise.all(senders.map((sender) => sender.stop()));

    expect(unanswered()).toBe(0);
    const stored = await readStored();
    expect(lostOrChanged(stored, (sender) => sender.acknowledged)).toEqual([]);
    expect(stored.size, 'Something is stored that nobody sent.').toBe(acknowledgedSoFar());
    const { rows: notices } = await pool.query(
      `select kind from notices where kind = 'reading-content-differs'`,
    );
    expect(notices, 'A reading sent again was taken for another one.').toEqual([]);
    const { rows: quarantined } = await pool.query('select code from quarantined_messages');
    expect(quarantined).toEqual([]);
  },
);

/** Ingest running on a database of its own, with probes whose devices connect over real sockets. */
import { connectAsync, type IClientOptions, type MqttClient } from 'mqtt';
import pg from 'pg';
import type { Sequelize } from 'sequelize';
import { vi } from 'vitest';
import { topicOf, type TopicKind } from '../../shared/contracts/mqtt.ts';
import type { Changed, LivePoint } from '../../shared/contracts/realtime.ts';
import { readConfig } from '../../server/config.ts';
import { User, type Device, type Point, type Probe, type Site } from '../../server/db/models/index.ts';
import { connectDatabase } from '../../server/db/sequelize.ts';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { startIngest, type Ingest, type IngestLimits } from '../../server/ingest/start-ingest.ts';
import { SettableClock } from '../../server/lib/clock.ts';
import { createLogger } from '../../server/lib/logger.ts';
import type { Parts } from '../../server/parts.ts';
import { createBroadcast } from '../../server/realtime/broadcast.ts';
import { testNow, type SentUpdate } from '../support/app.ts';
import { freshDatabase, type TestDatabase } from '../support/database.ts';
import { aDevice, aPoint, aProbe, aSite, installed } from '../support/rows.ts';

export const secret = 'a-secret-that-only-this-device-has';

/** A probe with its device, standing at a point. */
export interface Station {
  name: string;
  device: Device;
  probe: Probe;
  point: Point;
  site: Site;
}

export interface SentPoint extends LivePoint {
  probeId: number;
  siteId: number | null;
}

export interface Plant {
  parts: Parts;
  db: TestDatabase;
  clock: SettableClock;
  ingest: Ingest;
  /** Live updates sent so far. */
  events: SentUpdate[];
  points: SentPoint[];
  rows: <T extends pg.QueryResultRow>(sql: string, values?: unknown[]) => Promise<T[]>;
  /** A second connection for locks and the like; closed with the plant. */
  pool: pg.Pool;
  station: (more?: {
    device?: Partial<Device>;
    probe?: Partial<Probe>;
    point?: Partial<Point>;
  }) => Promise<Station>;
  connect: (station: Pick<Station, 'name'>, options?: IClientOptions) => Promise<MqttClient>;
  restartIngest: (limits?: IngestLimits, whileAway?: () => Promise<void>) => Promise<void>;
  stop: () => Promise<void>;
}

export interface PlantOptions {
  limits?: IngestLimits;
  environment?: Record<string, string>;
}

export async function startPlant({ limits, environment }: PlantOptions = {}): Promise<Plant> {
  const db = await freshDatabase();
  const config = readConfig({
    DATABASE_URL: db.appUrl,
    MQTT_PORT: '0',
    LOG_LEVEL: process.env.TEST_LOG ?? 'silent',
    ...environment,
  });
  const sequelize: Sequelize = connectDatabase(config.databaseUrl, {
    maxConnections: 3,
    applicationName: 'tests',
  });
  const pool = new pg.Pool({ connectionString: db.superuserUrl, max: 3 });
  pool.on('error', () => {});
  const clock = new SettableClock(testNow);
  const events: SentUpdate[] = [];
  const points: SentPoint[] = [];
  const broadcast = {
    ...createBroadcast(null),
    changed: (update: Changed, siteId: number | null) => void events.push({ ...update, siteId }),
    readings: (probeId: number, siteId: number | null, point: LivePoint) =>
      void points.push({ ...point, probeId, siteId }),
  } satisfies Parts['broadcast'];
  const parts: Parts = {
    config,
    sequelize,
    clock,
    log: createLogger(config.logLevel),
    broadcast,
    health: [],
  };
  const clients: MqttClient[] = [];
  let ingest = await startIngest(parts, limits);
  let installer: Promise<User> | null = null;
  const theInstaller = (): Promise<User> => (installer ??= anInstaller());

  return {
    parts,
    db,
    clock,
    events,
    points,
    pool,
    get ingest() {
      return ingest;
    },
    rows: async (sql, values) => (await pool.query(sql, values)).rows,
    station: async (more = {}) => {
      const site = await aSite();
      const point = await aPoint(site.id, more.point);
      const probe = await aProbe(site.id, more.probe);
      await installed(probe, point, (await theInstaller()).id);
      const device = await aDevice(probe.id, {
        secretHash: hashDeviceSecret(secret),
        bootText: null,
        isOnline: false,
        onlineWhy: null,
        lastSeenAt: null,
        settingsHash: null,
        reportedCellConstantPerCm: null,
        ...more.device,
      });
      return { name: device.name, device, probe, point, site };
    },
    connect: async ({ name }, options = {}) => {
      const client = await connectAsync(ingest.brokerUrl, {
        clientId: name,
        username: name,
        password: secret,
        reconnectPeriod: 0,
        connectTimeout: 5000,
        ...options,
      });
      // A refused reconnection is told here; without a listener it would end the test run.
      client.on('error', () => {});
      clients.push(client);
      return client;
    },
    restartIngest: async (next, whileAway) => {
      await ingest.stop();
      await whileAway?.();
      parts.health.length = 0;
      ingest = await startIngest(parts, next);
    },
    stop: async () => {
      await Promise.all(clients.map((client) => client.endAsync(true)));
      await ingest.stop();
      await sequelize.close();
      await pool.end();
      await db.drop();
    },
  };
}

const anInstaller = (): Promise<User> =>
  User.create({
    email: 'installer@plant.example',
    name: 'Installer',
    passwordHash: null,
    lockedUntil: null,
    passwordChangedAt: null,
    lastSignInAt: null,
    deactivatedAt: null,
  });

/** A time relative to noon of the test day. */
export const at = (seconds: number): string => new Date(Date.parse(testNow) + seconds * 1000).toISOString();

export const aReading = (n: number, more: Record<string, unknown> = {}): Record<string, unknown> => ({
  n,
  at: at(-10 + n / 1000),
  context: 'process',
  conductivity_us_cm: 1061,
  temperature_c: 13.02,
  conductance_us: 1061,
  solution: null,
  quality: 'good',
  flags: [],
  ...more,
});

export const boot = '01JE6M0T6Y';

export const aMessage = (
  readings: Record<string, unknown>[],
  more: Record<string, unknown> = {},
): Record<string, unknown> => ({
  v: 1,
  boot,
  sent: at(0),
  clock: { source: 'ntp', offset_ms: 12 },
  readings,
  ...more,
});

export const aBirth = (station: Station, more: Record<string, unknown> = {}): Record<string, unknown> => ({
  v: 1,
  boot,
  sent: at(0),
  device: station.name,
  serial: station.probe.serial,
  kind: station.probe.kind,
  firmware: '2.4.1',
  cell_constant_per_cm: 1,
  compensation: { model: 'none' },
  range_low_us_cm: 0,
  range_high_us_cm: 20_000,
  resolution_us_cm: 0.1,
  interval_s: 10,
  settings: 'sha256:9b1c4e00',
  ...more,
});

export const aState = (online: boolean, why: string, of = boot): Record<string, unknown> => ({
  v: 1,
  boot: of,
  online,
  why,
});

/** Publishes at QoS 1 and resolves with the acknowledgement. */
export const publish = async (
  client: MqttClient,
  name: string,
  kind: TopicKind,
  body: unknown,
  retain = false,
): Promise<void> => {
  const payload = typeof body === 'string' || Buffer.isBuffer(body) ? body : JSON.stringify(body);
  await client.publishAsync(topicOf(name, kind), payload, { qos: 1, retain });
};

/** Waits for a condition instead of for a time. */
export const eventually = <T>(look: () => T | Promise<T>, timeout = 10_000): Promise<T> =>
  vi.waitFor(look, { timeout, interval: 20 });

export const closed = (client: MqttClient): Promise<void> =>
  new Promise((resolve) => {
    if (!client.connected) return resolve();
    client.once('close', () => resolve());
  });

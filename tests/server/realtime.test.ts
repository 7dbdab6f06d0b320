/** Live updates over real sockets: who is let in, what reaches whom, and how often. */
import { createServer, type Server as HttpServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Sequelize } from 'sequelize';
import { io as connectTo, type Socket } from 'socket.io-client';
import request from 'supertest';
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import type {
  Changed,
  ClientToServer,
  LivePoint,
  ReadingsUpdate,
  ServerToClient,
  WatchTarget,
} from '../../shared/contracts/realtime.ts';
import type { Role } from '../../shared/contracts/vocabulary.ts';
import { buildApp } from '../../server/app.ts';
import { readConfig } from '../../server/config.ts';
import { Membership, Session, User, type Probe, type Site } from '../../server/db/models/index.ts';
import { connectDatabase } from '../../server/db/sequelize.ts';
import { createSessions, type SessionKit } from '../../server/http/authenticate.ts';
import { hashPassword } from '../../server/lib/hashing.ts';
import { systemClock } from '../../server/lib/clock.ts';
import { createLogger } from '../../server/lib/logger.ts';
import type { Parts } from '../../server/parts.ts';
import { createBroadcast, type RealtimeServer } from '../../server/realtime/broadcast.ts';
import { createRealtimeServer, openGateway } from '../../server/realtime/gateway.ts';
import { testPassword } from '../support/app.ts';
import { freshDatabase, type TestDatabase } from '../support/database.ts';
import { aPoint, aProbe, aSite, installed } from '../support/rows.ts';

/** A browser's live connection, with everything it heard. */
interface Page {
  socket: Socket<ServerToClient, ClientToServer>;
  changes: Changed[];
  frames: (ReadingsUpdate & { at: number })[];
  watch: (target: WatchTarget) => Promise<boolean>;
}

let db: TestDatabase;
let sequelize: Sequelize;
let sessions: SessionKit;
let io: RealtimeServer;
let http: HttpServer;
let parts: Parts;
let port: number;
let here: Site;
let elsewhere: Site;
let probe: Probe;
let foreignProbe: Probe;
const open: Socket[] = [];

beforeAll(async () => {
  db = await freshDatabase();
  const config = readConfig({ DATABASE_URL: db.appUrl, LOG_LEVEL: 'silent', CLIENT_DIR: '/nowhere' });
  sequelize = connectDatabase(config.databaseUrl, { maxConnections: 5, applicationName: 'tests' });
  io = createRealtimeServer();
  const broadcast = createBroadcast(io);
  parts = { config, sequelize, clock: systemClock, log: createLogger('silent'), broadcast, health: [] };
  sessions = createSessions(parts);
  http = createServer(buildApp(parts, sessions));
  openGateway(io, http, parts, sessions);
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  port = (http.address() as AddressInfo).port;

  here = await aSite();
  elsewhere = await aSite();
  [probe, foreignProbe] = await Promise.all([aProbe(here.id), aProbe(elsewhere.id)]);
  const installer = await somebody('manager', null);
  await installed(probe, await aPoint(here.id), installer.id);
  await installed(foreignProbe, await aPoint(elsewhere.id), installer.id);
});
afterEach(() => {
  for (const socket of open.splice(0)) socket.disconnect();
});
afterAll(async () => {
  parts.broadcast.stop();
  await io.close();
  await sessions.close();
  await sequelize.close();
  await db.drop();
});

let count = 0;
async function somebody(role: Role, siteId: number | null): Promise<User> {
  count += 1;
  const user = await User.create({
    email: `${role}-${count}@plant.example`,
    name: `Test ${role}`,
    passwordHash: await hashPassword(testPassword),
    lockedUntil: null,
    passwordChangedAt: null,
    lastSignInAt: null,
    deactivatedAt: null,
  });
  await Membership.create({ userId: user.id, siteId, role, endsOn: null, endedAt: null });
  return user;
}

async function cookieOf({ email }: User): Promise<string> {
  const answer = await request(http)
    .post('/api/sessions')
    .send({ email, password: testPassword })
    .expect(201);
  return String((answer.get('set-cookie') as unknown as string[])[0]).split(';')[0]!;
}

const dial = (headers: Record<string, string>): Page['socket'] => {
  const socket = connectTo(`http://127.0.0.1:${port}`, {
    transports: ['websocket'],
    extraHeaders: headers,
    reconnection: false,
    forceNew: true,
  });
  open.push(socket);
  return socket;
};

/** Why a connection was refused. */
const refusalOf = (headers: Record<string, string>): Promise<string> =>
  new Promise((resolve, reject) => {
    const socket = dial(headers);
    socket.once('connect_error', (error) => resolve(error.message));
    socket.once('connect', () => reject(new Error('The connection was let in.')));
  });

async function openPage(user: User): Promise<Page> {
  const socket = dial({ cookie: await cookieOf(user), origin: `http://127.0.0.1:${port}` });
  const page: Page = {
    socket,
    changes: [],
    frames: [],
    watch: (target) => socket.timeout(10_000).emitWithAck('watch', target),
  };
  socket.on('changed', (update) => page.changes.push(update));
  socket.on('readings', (update) => page.frames.push({ ...update, at: performance.now() }));
  await new Promise<void>((resolve, reject) => {
    socket.once('connect', resolve);
    socket.once('connect_error', reject);
  });
  // Rooms are joined after the handshake; a page has seen an update of everybody once it is in.
  await eventually(() => {
    parts.broadcast.changed({ slice: 'settings', id: 'ready', kind: 'changed' }, here.id);
    parts.broadcast.changed({ slice: 'settings', id: 'ready', kind: 'changed' }, elsewhere.id);
    parts.broadcast.changed({ slice: 'settings', id: 'ready', kind: 'changed' }, null);
    expect(page.changes.length).toBeGreaterThan(0);
  });
  await settled(page);
  return page;
}

const eventually = <T>(look: () => T | Promise<T>): Promise<T> =>
  vi.waitFor(look, { timeout: 10_000, interval: 20 });

/** Everything sent before now has arrived: frames of one connection keep their order. Then forgets it. */
async function settled(page: Page): Promise<void> {
  await page.watch({ probe: 0 });
  page.changes.length = 0;
}

const aPointAt = (n: number): LivePoint => ({
  at: new Date(Date.parse('2026-12-01T12:00:00Z') + n * 1000).toISOString(),
  conductivityUsCm: 1000 + n,
  temperatureC: 25,
  valueUsCm: 1000 + n,
  context: 'process',
  quality: 'good',
  flags: [],
});

describe('the door', () => {
  it.each([
    ['nobody', {}],
    ['a cookie that this server did not sign', { cookie: 'saltmark.sid=s%3Ainvented.c2lnbmF0dXJl' }],
  ])('refuses %s: sign in first', async (_who, headers) => {
    expect(await refusalOf(headers)).toBe('sessions.required');
  });

  it('refuses a session that has ended since', async () => {
    const user = await somebody('operator', here.id);
    const cookie = await cookieOf(user);
    await Session.destroy({ where: {} });
    expect(await refusalOf({ cookie })).toBe('sessions.required');
  });

  it.each(['https://elsewhere.example', 'null', 'http://127.0.0.1:1'])(
    'refuses a page of the origin %s, though the browser sends the cookie along',
    async (origin) => {
      const cookie = await cookieOf(await somebody('operator', here.id));
      expect(await refusalOf({ cookie, origin })).toMatch(/websocket error|forbidden/i);
    },
  );

  it('lets a person of the plant in', async () => {
    const page = await openPage(await somebody('operator', here.id));
    expect(page.socket.connected).toBe(true);
  });
});

describe('watching', () => {
  it('is allowed at one’s own site and refused at another', async () => {
    const page = await openPage(await somebody('technician', here.id));
    expect(await page.watch({ site: here.id })).toBe(true);
    expect(await page.watch({ probe: probe.id })).toBe(true);
    expect(await page.watch({ site: elsewhere.id })).toBe(false);
    expect(await page.watch({ probe: foreignProbe.id })).toBe(false);
    expect(await page.watch({ probe: 999_999 })).toBe(false);
    expect(await page.watch({ site: 'all' } as never)).toBe(false);
    expect(await page.watch(null as never)).toBe(false);
  });

  it('brings no readings of a site that is not granted, however it was asked for', async () => {
    const page = await openPage(await somebody('technician', here.id));
    await page.watch({ site: here.id });
    await page.watch({ site: elsewhere.id });
    await page.watch({ probe: foreignProbe.id });
    parts.broadcast.readings(foreignProbe.id, elsewhere.id, aPointAt(1));
    parts.broadcast.readings(probe.id, here.id, aPointAt(1));
    await eventually(() => expect(page.frames.map((frame) => frame.probe)).toContain(probe.id));
    await settled(page);
    expect(page.frames.map((frame) => frame.probe)).toEqual([probe.id]);
  });

  it('ends when the page says so', async () => {
    const page = await openPage(await somebody('operator', here.id));
    await page.watch({ probe: probe.id });
    page.socket.emit('unwatch', { probe: probe.id });
    await settled(page);
    parts.broadcast.readings(probe.id, here.id, aPointAt(2));
    await settled(page);
    expect(page.frames).toEqual([]);
  });
});

describe('a change', () => {
  it('reaches the people of its site and those of all sites, and nobody else', async () => {
    const [own, all, other] = await Promise.all([
      openPage(await somebody('operator', here.id)),
      openPage(await somebody('manager', null)),
      openPage(await somebody('operator', elsewhere.id)),
    ]);
    for (const page of [own, all, other]) await settled(page);
    parts.broadcast.changed({ slice: 'probes', id: probe.id, kind: 'changed' }, here.id);
    parts.broadcast.changed({ slice: 'settings', id: 'demo', kind: 'changed' }, null);
    const forEveryone = { slice: 'settings', id: 'demo', kind: 'changed' };
    const forHere = { slice: 'probes', id: probe.id, kind: 'changed' };
    await eventually(() => {
      expect(own.changes).toEqual([forHere, forEveryone]);
      expect(all.changes).toEqual([forHere, forEveryone]);
      expect(other.changes).toEqual([forEveryone]);
    });
  });

  it('made over HTTP is told after its commit and carries no data', async () => {
    const page = await openPage(await somebody('operator', here.id));
    const manager = request.agent(http);
    const { email } = await somebody('administrator', null);
    await manager.post('/api/sessions').send({ email, password: testPassword }).expect(201);
    await manager.post(`/api/sites/${here.id}/areas`).send({ name: 'Rinse hall' }).expect(201);
    await eventually(() => expect(page.changes.map(({ slice }) => slice)).toEqual(['areas', 'sites']));
    for (const change of page.changes)
      expect(Object.keys(change).toSorted()).toEqual(['id', 'kind', 'slice']);
  });
});

describe('readings', () => {
  /** Publishes one point every few milliseconds for a while; answers how long it took. */
  async function stream(points: number, everyMs: number): Promise<number> {
    const began = performance.now();
    for (let n = 0; n < points; n += 1) {
      await eventually(() => expect(performance.now() - began).toBeGreaterThanOrEqual(n * everyMs));
      parts.broadcast.readings(probe.id, here.id, aPointAt(n));
    }
    return performance.now() - began;
  }

  it('come in about four frames a second per probe, in order, and nothing is lost below the cap', async () => {
    const page = await openPage(await somebody('operator', here.id));
    // Twice in the audience, by site and by probe: still each frame once.
    await page.watch({ site: here.id });
    await page.watch({ probe: probe.id });
    const points = 60;
    const lasted = await stream(points, 25);
    const seen = (): string[] => page.frames.flatMap((frame) => frame.points.map(({ at }) => at));
    await eventually(() => expect(seen()).toHaveLength(points));
    expect(seen()).toEqual(Array.from({ length: points }, (_, n) => aPointAt(n).at));
    // The first at once, then one each quarter of a second, and the rest at the end.
    expect(page.frames.length).toBeLessThanOrEqual(Math.ceil(lasted / 250) + 2);
    expect(page.frames.length).toBeGreaterThan(2);
    expect(page.frames[0]?.points).toHaveLength(1);
  });

  it('of forty probes in one turn all reach the page, none crowds out another', async () => {
    const page = await openPage(await somebody('operator', here.id));
    const probes = await Promise.all(Array.from({ length: 40 }, () => aProbe(here.id)));
    await page.watch({ site: here.id });
    for (const { id } of probes) parts.broadcast.readings(id, here.id, aPointAt(0));
    await eventually(() => expect(page.frames.length).toBeGreaterThanOrEqual(40));
    expect(new Set(page.frames.map((frame) => frame.probe))).toEqual(new Set(probes.map(({ id }) => id)));
  });

  it('in a flood a frame holds the newest sixty and no more', async () => {
    const page = await openPage(await somebody('operator', here.id));
    const flooding = await aProbe(here.id);
    await page.watch({ site: here.id });
    for (let n = 0; n < 500; n += 1) parts.broadcast.readings(flooding.id, here.id, aPointAt(n));
    await eventually(() => expect(page.frames).toHaveLength(2));
    expect(page.frames[0]?.points.map(({ at }) => at)).toEqual([aPointAt(0).at]);
    expect(page.frames[1]?.points.map(({ at }) => at)).toEqual(
      Array.from({ length: 60 }, (_, n) => aPointAt(440 + n).at),
    );
  });
});

describe('when rights change', () => {
  it('the open page is disconnected, and comes back with the rights it has now', async () => {
    const user = await somebody('technician', here.id);
    const page = await openPage(user);
    const left = new Promise<string>((resolve) => page.socket.once('disconnect', resolve));
    const administrator = request.agent(http);
    const { email } = await somebody('administrator', null);
    await administrator.post('/api/sessions').send({ email, password: testPassword }).expect(201);
    const grant = await Membership.findOne({ where: { userId: user.id } });
    await administrator
      .post(`/api/memberships/${grant!.id}/end`)
      .send({ reason: 'Moved to another plant.' })
      .expect((answer) => {
        expect([200, 204]).toContain(answer.status);
      });
    expect(await left).toMatch(/server disconnect|transport close/);

    await Membership.create({
      userId: user.id,
      siteId: elsewhere.id,
      role: 'operator',
      endsOn: null,
      endedAt: null,
    });
    const again = await openPage(user);
    expect(await again.watch({ site: here.id })).toBe(false);
    expect(await again.watch({ site: elsewhere.id })).toBe(true);
  });

  it('signing out everywhere ends the pages of that person only', async () => {
    const [user, other] = [await somebody('operator', here.id), await somebody('operator', here.id)];
    const [page, bystander] = [await openPage(user), await openPage(other)];
    const left = new Promise<string>((resolve) => page.socket.once('disconnect', resolve));
    await request(http)
      .delete('/api/sessions')
      .set('cookie', await cookieOf(user))
      .expect(204);
    expect(await left).toMatch(/server disconnect|transport close/);
    expect(bystander.socket.connected).toBe(true);
  });
});

/**
 * The whole application on a database of its own, with a clock that tests move and people who sign in for real.
 * Every answer is parsed against its contract before it leaves.
 */
import { createServer, type Server } from 'node:http';
import type { Sequelize } from 'sequelize';
import request, { type Agent } from 'supertest';
import type { Changed } from '../../shared/contracts/realtime.ts';
import type { Role } from '../../shared/contracts/vocabulary.ts';
import { buildApp } from '../../server/app.ts';
import { readConfig, type Config } from '../../server/config.ts';
import { AuditEvent, Membership, User } from '../../server/db/models/index.ts';
import { connectDatabase } from '../../server/db/sequelize.ts';
import { createSessions } from '../../server/http/authenticate.ts';
import { SettableClock } from '../../server/lib/clock.ts';
import { hashPassword } from '../../server/lib/hashing.ts';
import { createLogger } from '../../server/lib/logger.ts';
import type { Parts } from '../../server/parts.ts';
import { createBroadcast, type Broadcast } from '../../server/realtime/broadcast.ts';
import { freshDatabase, type TestDatabase } from './database.ts';

export const testPassword = 'a-long-password-for-tests';
/** A Tuesday noon in winter: no summer time, no month end. */
export const testNow = '2026-12-01T12:00:00.000Z';

/** A live update as it was sent, with the site whose people it reached (null = everybody signed in). */
export interface SentUpdate extends Changed {
  siteId: number | null;
}

/** A role everywhere, or at one site. */
export type Somebody = Role | { role: Role; siteId: number | null };

export interface TestApp {
  parts: Parts;
  config: Config;
  db: TestDatabase;
  sequelize: Sequelize;
  clock: SettableClock;
  server: Server;
  /** Live updates sent so far; `events.length = 0` forgets them. */
  events: SentUpdate[];
  /** People whose connections were ended. */
  disconnected: number[];
  /** Somebody with that role, signed in; the same agent each time. */
  as: (who: Somebody) => Promise<Agent>;
  /** The person behind `as(who)`. */
  person: (who: Somebody) => Promise<User>;
  /** Nobody: no session. */
  nobody: () => Agent;
  /** The newest entry of the audit trail with this action, or undefined. */
  audited: (action: string) => Promise<AuditEvent | undefined>;
  auditCount: () => Promise<number>;
  stop: () => Promise<void>;
}

function recordingBroadcast(events: SentUpdate[], disconnected: number[]): Broadcast {
  const silent = createBroadcast(null);
  return {
    ...silent,
    changed: (update, siteId) => void events.push({ ...update, siteId }),
    disconnectUser: (userId) => void disconnected.push(userId),
  };
}

const keyOf = (who: Somebody): string =>
  typeof who === 'string' ? `${who}-all` : `${who.role}-${who.siteId ?? 'all'}`;
const grantOf = (who: Somebody): { role: Role; siteId: number | null } =>
  typeof who === 'string' ? { role: who, siteId: null } : who;

export async function startTestApp(environment: Record<string, string | undefined> = {}): Promise<TestApp> {
  const db = await freshDatabase();
  const config = readConfig({
    DATABASE_URL: db.appUrl,
    CHECK_ANSWERS: '1',
    LOG_LEVEL: 'silent',
    CLIENT_DIR: '/nowhere',
    ...environment,
  });
  const sequelize = connectDatabase(config.databaseUrl, { maxConnections: 5, applicationName: 'tests' });
  const clock = new SettableClock(testNow);
  const events: SentUpdate[] = [];
  const disconnected: number[] = [];
  const broadcast = recordingBroadcast(events, disconnected);
  const parts: Parts = { config, sequelize, clock, log: createLogger('silent'), broadcast, health: [] };
  const sessions = createSessions(parts);
  const server = createServer(buildApp(parts, sessions));
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const people = peopleOf(server);

  return {
    parts,
    config,
    db,
    sequelize,
    clock,
    server,
    events,
    disconnected,
    ...people,
    nobody: () => request.agent(server),
    audited: async (action) =>
      (await AuditEvent.findOne({ where: { action }, order: [['sequence', 'DESC']] })) ?? undefined,
    auditCount: () => AuditEvent.count(),
    stop: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      broadcast.stop();
      await sessions.close();
      await sequelize.close();
      await db.drop();
    },
  };
}

/** Made on first use: a user with one grant, then an agent that has signed in. */
function peopleOf(server: Server): Pick<TestApp, 'as' | 'person'> {
  const passwordHash = hashPassword(testPassword);
  const users = new Map<string, Promise<User>>();
  const agents = new Map<string, Promise<Agent>>();

  const create = async (who: Somebody): Promise<User> => {
    const { role, siteId } = grantOf(who);
    const user = await User.create({
      email: `${keyOf(who)}@plant.example`,
      name: `Test ${role}`,
      passwordHash: await passwordHash,
      lockedUntil: null,
      passwordChangedAt: null,
      lastSignInAt: null,
      deactivatedAt: null,
    });
    const endsOn = role === 'auditor' ? '2099-12-31' : null;
    await Membership.create({ userId: user.id, siteId, role, endsOn, endedAt: null });
    return user;
  };
  const signIn = async (who: Somebody): Promise<Agent> => {
    const { email } = await person(who);
    const agent = request.agent(server);
    await agent.post('/api/sessions').send({ email, password: testPassword }).expect(201);
    return agent;
  };
  const once = <T>(known: Map<string, Promise<T>>, who: Somebody, make: () => Promise<T>): Promise<T> => {
    const found = known.get(keyOf(who)) ?? make();
    known.set(keyOf(who), found);
    return found;
  };
  const person = (who: Somebody) => once(users, who, () => create(who));
  return { person, as: (who) => once(agents, who, () => signIn(who)) };
}

/** Sign-in, its lock, and the person behind a session. */
import type { Welcome } from '../../../shared/contracts/sessions.ts';
import { AppError } from '../../errors.ts';
import { Membership, Setting, User } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import type { Actor, RequestSource } from '../../http/actor.ts';
import { hashPassword, verifyPassword } from '../../lib/hashing.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent, type OtherActor } from '../audit-events/service.ts';
import { demoSignIns } from './demo-sign-ins.ts';
import { deleteOtherSessions } from './queries.ts';

export { deleteOtherSessions };

/** Wrong passwords in a row before the lock, and its length: NIST SP 800-63B §5.2.2 allows up to 100; we are stricter. */
const wrongBeforeLock = 5;
const lockMinutes = 15;

/** Verified against when nobody has the address, so that both refusals take the same time. */
const noOnesHash = hashPassword('nobody signs in with this');

/** The active grants of a person on a day, by the rule that an ended or run-out grant counts for nothing. */
export async function grantsOf(userId: number, today: string): Promise<Actor['grants']> {
  const rows = await Membership.findAll({ where: { userId, endedAt: null }, order: [['id', 'ASC']] });
  return rows
    .filter((row) => row.endsOn === null || row.endsOn >= today)
    .map((row) => ({ siteId: row.siteId, role: row.role }));
}

export async function findActor(parts: Parts, userId: number, source: RequestSource): Promise<Actor | null> {
  const user = await User.findByPk(userId);
  if (!user || user.deactivatedAt !== null) return null;
  const today = parts.clock.now().toISOString().slice(0, 10);
  return { userId, name: user.name, email: user.email, grants: await grantsOf(userId, today), source };
}

const signInDesk = (source: RequestSource): OtherActor => ({ kind: 'system', name: 'sign-in', source });

async function recordFailure(
  parts: Parts,
  user: User | null,
  email: string,
  source: RequestSource,
): Promise<void> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const entry = { objectKind: 'users', objectId: user?.id ?? null, siteId: null };
    if (user) {
      const failures = user.failedSignIns + 1;
      const isLocking = failures >= wrongBeforeLock;
      const lockedUntil = isLocking
        ? new Date(parts.clock.now().getTime() + lockMinutes * 60_000)
        : user.lockedUntil;
      await User.update(
        { failedSignIns: isLocking ? 0 : failures, lockedUntil },
        { where: { id: user.id }, transaction },
      );
      if (isLocking) {
        await recordAuditEvent(parts, transaction, signInDesk(source), {
          ...entry,
          action: 'users.locked',
          newValue: { email: user.email, lockedUntil },
        });
      }
    }
    await recordAuditEvent(parts, transaction, signInDesk(source), {
      ...entry,
      action: 'sessions.sign-in-failed',
      newValue: { email },
    });
  });
}

/** Answers the user's id, or throws; every attempt leaves an audit event. */
export async function checkCredentials(
  parts: Parts,
  given: { email: string; password: string },
  source: RequestSource,
): Promise<number> {
  const email = given.email.trim().toLowerCase();
  const user = await User.findOne({ where: { email } });
  if (user?.lockedUntil && user.lockedUntil > parts.clock.now()) {
    await recordFailure(parts, null, email, source);
    throw new AppError('sessions.locked');
  }
  const isRight = await verifyPassword(user?.passwordHash ?? (await noOnesHash), given.password);
  if (!user?.passwordHash || !isRight || user.deactivatedAt !== null) {
    await recordFailure(parts, user, email, source);
    throw new AppError('sessions.credentials-wrong');
  }
  const actor = await findActor(parts, user.id, source);
  if (!actor || actor.grants.length === 0) throw new AppError('sessions.no-grants');
  await inTransaction(parts.sequelize, async (transaction) => {
    const now = parts.clock.now();
    await User.update(
      { failedSignIns: 0, lockedUntil: null, lastSignInAt: now },
      { where: { id: user.id }, transaction },
    );
    await recordAuditEvent(parts, transaction, actor, {
      action: 'sessions.signed-in',
      objectKind: 'users',
      objectId: user.id,
      siteId: null,
    });
  });
  return user.id;
}

/**
 * The password again, for a signature. False when it is wrong; a wrong one counts towards the lock like one at sign-in.
 */
export async function confirmPerson(
  parts: Parts,
  userId: number,
  password: string,
  source: RequestSource,
): Promise<boolean> {
  const user = await User.findByPk(userId);
  if (user?.lockedUntil && user.lockedUntil > parts.clock.now()) throw new AppError('sessions.locked');
  const isRight = await verifyPassword(user?.passwordHash ?? (await noOnesHash), password);
  if (user?.passwordHash && isRight && user.deactivatedAt === null) return true;
  await recordFailure(parts, user, user?.email ?? 'nobody', source);
  return false;
}

export async function recordSignOut(parts: Parts, actor: Actor): Promise<void> {
  await inTransaction(parts.sequelize, (transaction) =>
    recordAuditEvent(parts, transaction, actor, {
      action: 'sessions.signed-out',
      objectKind: 'users',
      objectId: actor.userId,
      siteId: null,
    }),
  );
}

/** Ends every session of a person, on every device, and the live connections with them. */
export async function endAllSessions(parts: Parts, userId: number, actor: Actor): Promise<void> {
  await inTransaction(parts.sequelize, async (transaction) => {
    await deleteOtherSessions(parts, userId, null, transaction);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'sessions.ended-everywhere',
      objectKind: 'users',
      objectId: userId,
      siteId: null,
    });
    transaction.afterCommit(() => parts.broadcast.disconnectUser(userId));
  });
}

/** What the sign-in page shows before anybody is known. */
export async function readWelcome(): Promise<Welcome> {
  const [people, demo] = await Promise.all([User.count(), Setting.findByPk('demo')]);
  return { needsFirstAdministrator: people === 0, demo: demo ? demoSignIns : null };
}

/** People: created by an administrator, invited by a one-time link, deactivated but never deleted. */
import { UniqueConstraintError, type Transaction } from 'sequelize';
import type {
  ChangePassword,
  ChangeUser,
  CreateFirstAdministrator,
  CreateUser,
  SetPassword,
} from '../../../shared/contracts/users.ts';
import { AppError } from '../../errors.ts';
import { Membership, PasswordToken, User } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import type { Actor, RequestSource } from '../../http/actor.ts';
import { may, maySomewhere } from '../../http/authorise.ts';
import { hashPassword, newSecret, sha256Hex, verifyPassword } from '../../lib/hashing.ts';
import { queueMail } from '../../mail/outbox.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { deleteOtherSessions } from '../sessions/service.ts';
import { lockFirstPerson } from './queries.ts';
import { userPolicy } from './policy.ts';

const invitationDays = 7;

/** Administrators of one site read people, so that they can grant roles there; changing a person asks for all sites. */
function authoriseReading(actor: Actor): void {
  if (!maySomewhere(userPolicy, 'read', actor)) throw new AppError('users.forbidden');
}

export function authoriseChanging(actor: Actor): void {
  if (!may(userPolicy, 'change', actor, null)) throw new AppError('users.forbidden');
}

export async function listUsers(actor: Actor): Promise<User[]> {
  authoriseReading(actor);
  return User.findAll({
    include: activeMemberships,
    order: [
      ['name', 'ASC'],
      ['id', 'ASC'],
    ],
  });
}

const activeMemberships = {
  association: 'memberships',
  where: { endedAt: null },
  required: false,
  include: [{ association: 'site' }],
};

export async function findUser(actor: Actor, id: number): Promise<User> {
  authoriseReading(actor);
  const user = await User.findByPk(id, { include: activeMemberships });
  if (!user) throw new AppError('users.not-found');
  return user;
}

async function refuseTakenEmail<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new AppError('users.email-taken');
    throw error;
  }
}

const auditView = (user: User) => ({ email: user.email, name: user.name, deactivatedAt: user.deactivatedAt });

/** Creates the person and mails a one-time link to set the password. */
export async function createUser(parts: Parts, actor: Actor, input: CreateUser): Promise<User> {
  authoriseChanging(actor);
  const user = await refuseTakenEmail(() =>
    inTransaction(parts.sequelize, async (transaction) => {
      const row = await User.create({ ...input, ...blankCredentials }, { transaction });
      await invite(parts, transaction, row);
      await recordAuditEvent(parts, transaction, actor, {
        action: 'users.created',
        objectKind: 'users',
        objectId: row.id,
        objectVersion: row.version,
        siteId: null,
        newValue: auditView(row),
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'users', id: row.id, kind: 'created' }, null),
      );
      return row;
    }),
  );
  return findUser(actor, user.id);
}

const blankCredentials = {
  passwordHash: null,
  lockedUntil: null,
  passwordChangedAt: null,
  lastSignInAt: null,
  deactivatedAt: null,
};

async function invite(parts: Parts, transaction: Transaction, user: User): Promise<void> {
  const token = newSecret();
  const expiresAt = new Date(parts.clock.now().getTime() + invitationDays * 86_400_000);
  await PasswordToken.create(
    { userId: user.id, tokenHash: sha256Hex(token), purpose: 'set-password', expiresAt, usedAt: null },
    { transaction },
  );
  await queueMail(parts, transaction, {
    to: user.email,
    kind: 'users.invitation',
    subject: 'Set your Saltmark password',
    text: [
      `Hello ${user.name},`,
      '',
      'you have been added to Saltmark. Open this address within seven days and choose a password:',
      `${parts.config.publicUrl}/set-password?token=${token}`,
      '',
      'The address works once. If you did not expect this mail, leave it alone.',
    ].join('\n'),
  });
}

/** Sends a fresh link to somebody who lost the password or the first link. */
export async function inviteAgain(parts: Parts, actor: Actor, id: number): Promise<void> {
  authoriseChanging(actor);
  const user = await findUser(actor, id);
  await inTransaction(parts.sequelize, async (transaction) => {
    await PasswordToken.update(
      { usedAt: parts.clock.now() },
      { where: { userId: id, usedAt: null }, transaction },
    );
    await invite(parts, transaction, user);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'users.invited-again',
      objectKind: 'users',
      objectId: id,
      siteId: null,
    });
  });
}

export async function changeUser(parts: Parts, actor: Actor, id: number, input: ChangeUser): Promise<User> {
  authoriseChanging(actor);
  const user = await findUser(actor, id);
  const before = auditView(user);
  await refuseTakenEmail(() =>
    inTransaction(parts.sequelize, async (transaction) => {
      const fields = {
        name: input.name ?? user.name,
        email: input.email ?? user.email,
        version: input.version + 1,
      };
      const [changed] = await User.update(fields, { where: { id, version: input.version }, transaction });
      if (changed === 0) throw new AppError('users.changed-meanwhile');
      await recordAuditEvent(parts, transaction, actor, {
        action: 'users.changed',
        objectKind: 'users',
        objectId: id,
        objectVersion: fields.version,
        siteId: null,
        oldValue: before,
        newValue: { ...before, name: fields.name, email: fields.email },
      });
      transaction.afterCommit(() => parts.broadcast.changed({ slice: 'users', id, kind: 'changed' }, null));
    }),
  );
  return findUser(actor, id);
}

export async function deactivateUser(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { reason: string; version: number },
): Promise<User> {
  authoriseChanging(actor);
  if (id === actor.userId) throw new AppError('users.self-change');
  const user = await findUser(actor, id);
  await inTransaction(parts.sequelize, async (transaction) => {
    const deactivatedAt = user.deactivatedAt ?? parts.clock.now();
    const [changed] = await User.update(
      { deactivatedAt, version: input.version + 1 },
      { where: { id, version: input.version }, transaction },
    );
    if (changed === 0) throw new AppError('users.changed-meanwhile');
    await deleteOtherSessions(parts, id, null, transaction);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'users.deactivated',
      objectKind: 'users',
      objectId: id,
      objectVersion: input.version + 1,
      siteId: null,
      oldValue: { deactivatedAt: user.deactivatedAt },
      newValue: { deactivatedAt },
      reason: input.reason,
    });
    transaction.afterCommit(() => {
      parts.broadcast.disconnectUser(id);
      parts.broadcast.changed({ slice: 'users', id, kind: 'changed' }, null);
    });
  });
  return findUser(actor, id);
}

/** Lifts a sign-in lock before it ends by itself. */
export async function unlockUser(parts: Parts, actor: Actor, id: number): Promise<User> {
  authoriseChanging(actor);
  const user = await findUser(actor, id);
  await inTransaction(parts.sequelize, async (transaction) => {
    await User.update({ lockedUntil: null, failedSignIns: 0 }, { where: { id }, transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'users.unlocked',
      objectKind: 'users',
      objectId: id,
      siteId: null,
      oldValue: { lockedUntil: user.lockedUntil },
      newValue: { lockedUntil: null },
    });
  });
  return findUser(actor, id);
}

function refuseWeakPassword(password: string, email: string): void {
  const own = email.split('@')[0] ?? '';
  const isRepetition = new Set(password).size < 5;
  if (
    isRepetition ||
    password.toLowerCase().includes(email.toLowerCase()) ||
    password.toLowerCase() === own
  ) {
    throw new AppError('users.password-weak');
  }
}

/** Changes one's own password and ends the person's other sessions. */
export async function changePassword(
  parts: Parts,
  actor: Actor,
  sessionId: string,
  input: ChangePassword,
): Promise<void> {
  const user = await User.findByPk(actor.userId);
  if (!user?.passwordHash || !(await verifyPassword(user.passwordHash, input.currentPassword))) {
    throw new AppError('users.password-wrong', {
      issues: [{ path: 'currentPassword', message: 'This is not your current password.' }],
    });
  }
  await storePassword(parts, user, input.newPassword, actor, sessionId);
}

/** The far end of an invitation: sets the password by a link that works once. */
export async function setPasswordByToken(
  parts: Parts,
  input: SetPassword,
  source: RequestSource,
): Promise<void> {
  const token = await PasswordToken.findOne({ where: { tokenHash: sha256Hex(input.token) } });
  const user = token && (await User.findByPk(token.userId));
  if (
    !token ||
    !user ||
    token.usedAt !== null ||
    token.expiresAt <= parts.clock.now() ||
    user.deactivatedAt !== null
  ) {
    throw new AppError('users.token-invalid');
  }
  const actor: Actor = { userId: user.id, name: user.name, email: user.email, grants: [], source };
  await storePassword(parts, user, input.newPassword, actor, null, token.id);
}

async function storePassword(
  parts: Parts,
  user: User,
  password: string,
  actor: Actor,
  keepSession: string | null,
  tokenId?: number,
): Promise<void> {
  refuseWeakPassword(password, user.email);
  const passwordHash = await hashPassword(password);
  await inTransaction(parts.sequelize, async (transaction) => {
    const now = parts.clock.now();
    if (tokenId !== undefined) {
      const [used] = await PasswordToken.update(
        { usedAt: now },
        { where: { id: tokenId, usedAt: null }, transaction },
      );
      if (used === 0) throw new AppError('users.token-invalid');
    }
    await User.update(
      { passwordHash, passwordChangedAt: now, failedSignIns: 0, lockedUntil: null },
      { where: { id: user.id }, transaction },
    );
    await deleteOtherSessions(parts, user.id, keepSession, transaction);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'users.password-changed',
      objectKind: 'users',
      objectId: user.id,
      siteId: null,
    });
  });
}

/** `DEMO=0`: the first visitor becomes administrator of all sites; everybody after that is refused. */
export async function createFirstAdministrator(
  parts: Parts,
  input: CreateFirstAdministrator,
  source: RequestSource,
): Promise<number> {
  refuseWeakPassword(input.password, input.email);
  const passwordHash = await hashPassword(input.password);
  return inTransaction(parts.sequelize, async (transaction) => {
    await lockFirstPerson(parts, transaction);
    if ((await User.count({ transaction })) > 0) throw new AppError('users.setup-done');
    const now = parts.clock.now();
    const user = await User.create(
      { ...blankCredentials, email: input.email, name: input.name, passwordHash, passwordChangedAt: now },
      { transaction },
    );
    await Membership.create(
      { userId: user.id, siteId: null, role: 'administrator', endsOn: null, endedAt: null },
      { transaction },
    );
    const actor: Actor = {
      userId: user.id,
      name: user.name,
      email: user.email,
      grants: [{ siteId: null, role: 'administrator' }],
      source,
    };
    await recordAuditEvent(parts, transaction, actor, {
      action: 'users.first-administrator-created',
      objectKind: 'users',
      objectId: user.id,
      siteId: null,
      newValue: auditView(user),
    });
    return user.id;
  });
}

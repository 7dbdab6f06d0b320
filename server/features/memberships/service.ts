/** Roles: granted and ended by the administrator of the site concerned, each with a reason. */
import { UniqueConstraintError } from 'sequelize';
import type { GrantRole } from '../../../shared/contracts/memberships.ts';
import { AppError } from '../../errors.ts';
import { Membership, Site, User } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { membershipPolicy } from './policy.ts';
import { countOtherAdministrators } from './queries.ts';

const withSite = { include: [{ association: 'site' }] };

/** The grants of a person in force today, with the site's name. */
export async function grantsWithSites(parts: Parts, userId: number) {
  const today = parts.clock.now().toISOString().slice(0, 10);
  const rows = await Membership.findAll({
    where: { userId, endedAt: null },
    ...withSite,
    order: [['id', 'ASC']],
  });
  return rows
    .filter((row) => row.endsOn === null || row.endsOn >= today)
    .map((row) => ({
      siteId: row.siteId,
      siteName: row.site?.name ?? null,
      role: row.role,
      endsOn: row.endsOn,
    }));
}

export async function grantRole(parts: Parts, actor: Actor, input: GrantRole): Promise<Membership> {
  if (!may(membershipPolicy, 'grant', actor, input.siteId)) throw new AppError('memberships.forbidden');
  if (!(await User.findByPk(input.userId))) throw new AppError('users.not-found');
  if (input.siteId !== null && !(await Site.findByPk(input.siteId))) throw new AppError('sites.not-found');
  try {
    const id = await inTransaction(parts.sequelize, async (transaction) => {
      const { reason, ...grant } = input;
      const row = await Membership.create({ ...grant, endedAt: null }, { transaction });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'memberships.granted',
        objectKind: 'users',
        objectId: input.userId,
        siteId: input.siteId,
        newValue: { membershipId: row.id, ...grant },
        reason,
      });
      transaction.afterCommit(() => announce(parts, row.id, input.userId));
      return row.id;
    });
    return (await Membership.findByPk(id, withSite))!;
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new AppError('memberships.exists');
    throw error;
  }
}

/** Open pages of the person reconnect, and so join only the rooms still allowed. */
function announce(parts: Parts, id: number, userId: number): void {
  parts.broadcast.changed({ slice: 'memberships', id, kind: 'changed' }, null);
  parts.broadcast.changed({ slice: 'users', id: userId, kind: 'changed' }, null);
  parts.broadcast.disconnectUser(userId);
}

export async function endMembership(
  parts: Parts,
  actor: Actor,
  id: number,
  reason: string,
): Promise<Membership> {
  const row = await Membership.findByPk(id, withSite);
  if (!row || row.endedAt !== null) throw new AppError('memberships.not-found');
  if (!may(membershipPolicy, 'end', actor, row.siteId)) throw new AppError('memberships.forbidden');
  if (row.userId === actor.userId && row.role === 'administrator') throw new AppError('users.self-change');
  await inTransaction(parts.sequelize, async (transaction) => {
    const isAllSites = row.role === 'administrator' && row.siteId === null;
    if (isAllSites && (await countOtherAdministrators(parts, row.userId, transaction)) === 0)
      throw new AppError('users.last-administrator');
    const endedAt = parts.clock.now();
    const [ended] = await Membership.update({ endedAt }, { where: { id, endedAt: null }, transaction });
    if (ended === 0) throw new AppError('memberships.not-found');
    await recordAuditEvent(parts, transaction, actor, {
      action: 'memberships.ended',
      objectKind: 'users',
      objectId: row.userId,
      siteId: row.siteId,
      oldValue: { membershipId: id, role: row.role, siteId: row.siteId, endsOn: row.endsOn },
      newValue: { endedAt },
      reason,
    });
    transaction.afterCommit(() => announce(parts, id, row.userId));
  });
  return (await Membership.findByPk(id, withSite))!;
}

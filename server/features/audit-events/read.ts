/** Reading the trail: by site rights, newest first. */
import { Op, type WhereOptions } from 'sequelize';
import type { AuditEventsQuery } from '../../../shared/contracts/audit-events.ts';
import { AppError } from '../../errors.ts';
import { AuditEvent } from '../../db/models/index.ts';
import type { Actor } from '../../http/actor.ts';
import { may, maySomewhere } from '../../http/authorise.ts';
import { decodeCursor, encodeCursor } from '../../lib/cursor.ts';
import { auditEventPolicy } from './policy.ts';

/** Sites whose events the actor may read; null = everything, also the organisation-wide events. */
export function auditedSites(actor: Actor): number[] | null {
  if (!maySomewhere(auditEventPolicy, 'read', actor)) throw new AppError('audit-events.forbidden');
  const granted = actor.grants.filter((grant) =>
    may(auditEventPolicy, 'read', { grants: [grant] }, grant.siteId),
  );
  if (granted.some((grant) => grant.siteId === null)) return null;
  return granted.map((grant) => grant.siteId).filter((siteId): siteId is number => siteId !== null);
}

function filterOf(query: AuditEventsQuery, sites: number[] | null): WhereOptions<AuditEvent> {
  const instants = {
    ...(query.from && { [Op.gte]: new Date(query.from) }),
    ...(query.to && { [Op.lt]: new Date(query.to) }),
  };
  return {
    ...(query.action && { action: query.action }),
    ...(query.objectKind && { objectKind: query.objectKind }),
    ...(query.objectId && { objectId: query.objectId }),
    ...(query.actorId && { actorId: query.actorId }),
    ...((query.from || query.to) && { receivedAt: instants }),
    ...(sites && { siteId: { [Op.in]: sites } }),
  };
}

export async function listAuditEvents(
  actor: Actor,
  query: AuditEventsQuery,
): Promise<{ rows: AuditEvent[]; total: number; nextCursor: string | null }> {
  const where = filterOf(query, auditedSites(actor));
  const after = query.cursor === undefined ? null : decodeCursor(query.cursor, 1);
  if (query.cursor !== undefined && typeof after?.[0] !== 'number')
    throw new AppError('request.cursor-invalid');
  const total = await AuditEvent.count({ where });
  const page = after ? { [Op.and]: [where, { sequence: { [Op.lt]: after[0] as number } }] } : where;
  const rows = await AuditEvent.findAll({
    where: page,
    order: [['sequence', 'DESC']],
    limit: query.limit + 1,
  });
  const isMore = rows.length > query.limit;
  const shown = rows.slice(0, query.limit);
  return { rows: shown, total, nextCursor: isMore ? encodeCursor([Number(shown.at(-1)!.sequence)]) : null };
}

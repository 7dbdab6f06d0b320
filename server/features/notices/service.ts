/** Integrity notices: something that should not happen and that a person must look at. */
import { Op, type WhereOptions } from 'sequelize';
import type { z } from 'zod';
import type { noticesQuery } from '../../../shared/contracts/notices.ts';
import { AppError } from '../../errors.ts';
import { Notice } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { decodeCursor, encodeCursor } from '../../lib/cursor.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { noticePolicy } from './policy.ts';

type Query = z.output<typeof noticesQuery>;

/** A notice belongs to the site of its probe. */
const included = (sites: number[] | null) => [
  { association: 'device' },
  { association: 'probe', required: sites !== null, ...(sites && { where: { siteId: { [Op.in]: sites } } }) },
];

export async function listNotices(actor: Actor, query: Query) {
  const include = included(readableSites(actor));
  const where: WhereOptions<Notice> = query.open ? { closedAt: null } : {};
  const after = query.cursor === undefined ? null : decodeCursor(query.cursor, 1);
  if (query.cursor !== undefined && typeof after?.[0] !== 'number')
    throw new AppError('request.cursor-invalid');
  const total = await Notice.count({ where, include });
  const page = after ? { [Op.and]: [where, { id: { [Op.lt]: after[0] as number } }] } : where;
  const rows = await Notice.findAll({
    where: page,
    include,
    order: [['id', 'DESC']],
    limit: query.limit + 1,
  });
  const shown = rows.slice(0, query.limit);
  return {
    rows: shown,
    total,
    nextCursor: rows.length > query.limit ? encodeCursor([shown.at(-1)!.id]) : null,
  };
}

export async function closeNotice(parts: Parts, actor: Actor, id: number, reason: string): Promise<Notice> {
  const row = await Notice.findByPk(id, { include: included(readableSites(actor)) });
  if (!row) throw new AppError('notices.not-found');
  const siteId = row.probe?.siteId ?? null;
  if (!may(noticePolicy, 'close', actor, siteId)) throw new AppError('probes.forbidden');
  await inTransaction(parts.sequelize, async (transaction) => {
    const closedAt = parts.clock.now();
    const [changed] = await Notice.update(
      { closedAt, closedBy: actor.userId },
      { where: { id, closedAt: null }, transaction },
    );
    if (changed === 0) throw new AppError('notices.closed');
    await recordAuditEvent(parts, transaction, actor, {
      action: 'notices.closed',
      objectKind: 'notices',
      objectId: id,
      siteId,
      oldValue: { kind: row.kind, detail: row.detail },
      newValue: { closedAt },
      reason,
    });
    transaction.afterCommit(() => parts.broadcast.changed({ slice: 'notices', id, kind: 'changed' }, siteId));
  });
  return row.reload();
}

/** Messages the ingest could not use: kept raw, read and settled by an administrator, never deleted. */
import { Op, type WhereOptions } from 'sequelize';
import type { z } from 'zod';
import type { quarantineQuery } from '../../../shared/contracts/quarantine.ts';
import { AppError } from '../../errors.ts';
import { QuarantinedMessage } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { decodeCursor, encodeCursor } from '../../lib/cursor.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { quarantinePolicy } from './policy.ts';

type Query = z.output<typeof quarantineQuery>;

const authorise = (actor: Actor, action: keyof typeof quarantinePolicy): void => {
  if (!may(quarantinePolicy, action, actor, null)) throw new AppError('quarantine.forbidden');
};

export async function listQuarantined(actor: Actor, query: Query) {
  authorise(actor, 'read');
  const where: WhereOptions<QuarantinedMessage> = {
    ...(query.code && { code: query.code }),
    ...(query.open && { resolvedAt: null }),
    ...(query.q && { topic: { [Op.iLike]: `%${query.q.replace(/[\\%_]/g, '\\$&')}%` } }),
  };
  const after = query.cursor === undefined ? null : decodeCursor(query.cursor, 1);
  if (query.cursor !== undefined && typeof after?.[0] !== 'number')
    throw new AppError('request.cursor-invalid');
  const total = await QuarantinedMessage.count({ where });
  const page = after ? { [Op.and]: [where, { id: { [Op.lt]: after[0] as number } }] } : where;
  const rows = await QuarantinedMessage.findAll({
    where: page,
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

export async function readQuarantined(actor: Actor, id: number): Promise<QuarantinedMessage> {
  authorise(actor, 'read');
  const row = await QuarantinedMessage.findByPk(id);
  if (!row) throw new AppError('quarantine.not-found');
  return row;
}

export async function resolveQuarantined(
  parts: Parts,
  actor: Actor,
  id: number,
  reason: string,
): Promise<QuarantinedMessage> {
  authorise(actor, 'resolve');
  const row = await QuarantinedMessage.findByPk(id);
  if (!row) throw new AppError('quarantine.not-found');
  await inTransaction(parts.sequelize, async (transaction) => {
    const fields = { resolvedAt: parts.clock.now(), resolvedBy: actor.userId, resolution: reason };
    const [changed] = await QuarantinedMessage.update(fields, {
      where: { id, resolvedAt: null },
      transaction,
    });
    if (changed === 0) throw new AppError('quarantine.resolved');
    await recordAuditEvent(parts, transaction, actor, {
      action: 'quarantine.resolved',
      objectKind: 'quarantine',
      objectId: id,
      siteId: null,
      oldValue: { code: row.code, topic: row.topic },
      newValue: { resolvedAt: fields.resolvedAt },
      reason,
    });
    transaction.afterCommit(() =>
      parts.broadcast.changed({ slice: 'quarantine', id, kind: 'changed' }, null),
    );
  });
  return row.reload();
}

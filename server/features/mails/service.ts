/** The outbox as an administrator reads it: what was said to whom, and whether it left. */
import { Op } from 'sequelize';
import type { ListQuery } from '../../../shared/contracts/common.ts';
import { AppError } from '../../errors.ts';
import { Mail } from '../../db/models/index.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { decodeCursor, encodeCursor } from '../../lib/cursor.ts';
import { mailPolicy } from './policy.ts';

export async function listMails(actor: Actor, query: ListQuery) {
  if (!may(mailPolicy, 'read', actor, null)) throw new AppError('mails.forbidden');
  const after = query.cursor === undefined ? null : decodeCursor(query.cursor, 1);
  if (query.cursor !== undefined && typeof after?.[0] !== 'number')
    throw new AppError('request.cursor-invalid');
  const total = await Mail.count();
  const where = after ? { id: { [Op.lt]: after[0] as number } } : {};
  const rows = await Mail.findAll({ where, order: [['id', 'DESC']], limit: query.limit + 1 });
  const shown = rows.slice(0, query.limit);
  return {
    rows: shown,
    total,
    nextCursor: rows.length > query.limit ? encodeCursor([shown.at(-1)!.id]) : null,
  };
}

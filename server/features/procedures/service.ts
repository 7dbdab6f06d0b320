/** Procedures as versioned data: a run keeps the version it began with, and a version never changes. */
import { Op } from 'sequelize';
import type { ListOf } from '../../../shared/contracts/common.ts';
import {
  stepsIssue,
  type IssueProcedure,
  type ProceduresQuery,
} from '../../../shared/contracts/procedures.ts';
import { Procedure } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { may, maySomewhere } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { procedurePolicy } from './policy.ts';

/** Procedures by code, newest version first; only those in force unless `all` is asked for. */
export async function listProcedures(actor: Actor, query: ProceduresQuery): Promise<ListOf<Procedure>> {
  if (!maySomewhere(procedurePolicy, 'read', actor)) throw new AppError('procedures.not-found');
  const after = readCursor(query.cursor, ['text', 'integer']);
  const pattern = containsPattern(query.q);
  const where = {
    [Op.and]: [
      query.all === '1' ? {} : { replacedAt: null },
      query.code === undefined ? {} : { code: query.code },
      pattern === null ? {} : { name: { [Op.iLike]: pattern } },
    ],
  };
  const beyond =
    after === null
      ? {}
      : { [Op.or]: [{ code: { [Op.gt]: after[0] } }, { code: after[0], version: { [Op.lt]: after[1] } }] };
  const [found, total] = await Promise.all([
    Procedure.findAll({
      where: { [Op.and]: [where, beyond] },
      order: [
        ['code', 'ASC'],
        ['version', 'DESC'],
      ],
      limit: query.limit + 1,
    }),
    Procedure.count({ where }),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.code, row.version]);
  return { items: rows, total, nextCursor };
}

export async function readProcedure(actor: Actor, id: number): Promise<Procedure> {
  if (!maySomewhere(procedurePolicy, 'read', actor)) throw new AppError('procedures.not-found');
  const found = await Procedure.findByPk(id);
  if (!found) throw new AppError('procedures.not-found');
  return found;
}

function refuseOrder(input: IssueProcedure): void {
  const message = stepsIssue(input.steps);
  if (message) throw new AppError('procedures.order-impossible', { issues: [{ path: 'steps', message }] });
}

/** The version before stays readable and unchanged but for the time it was replaced. */
export async function issueProcedure(
  parts: Parts,
  actor: Actor,
  code: string,
  input: IssueProcedure,
): Promise<Procedure> {
  if (!may(procedurePolicy, 'issue', actor, null)) throw new AppError('procedures.forbidden');
  refuseOrder(input);
  const { basedOnVersion, reason, ...content } = input;
  const raced = { procedures_code_version_key: 'procedures.changed-meanwhile' } as const;
  return refusingByConstraint(raced, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const current = await Procedure.findOne({
        where: { code, replacedAt: null },
        transaction,
        lock: transaction.LOCK.UPDATE,
      });
      if (!current) throw new AppError('procedures.not-found');
      if (current.version !== basedOnVersion) throw new AppError('procedures.changed-meanwhile');
      const now = parts.clock.now();
      await current.update({ replacedAt: now }, { transaction });
      const issued = await Procedure.create(
        {
          ...content,
          code,
          version: current.version + 1,
          effectiveFrom: now,
          replacedAt: null,
          changeReason: reason,
          createdBy: actor.userId,
        },
        { transaction },
      );
      const { name, probeKinds, steps, criteria } = current;
      await recordAuditEvent(parts, transaction, actor, {
        action: 'procedures.issued',
        objectKind: 'procedures',
        objectId: issued.id,
        objectVersion: issued.version,
        siteId: null,
        oldValue: { code, version: current.version, name, probeKinds, steps, criteria },
        newValue: { code, version: issued.version, ...content },
        reason,
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'procedures', id: issued.id, kind: 'created' }, null),
      );
      return issued;
    }),
  );
}

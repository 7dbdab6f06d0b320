/**
 * Lots of reference solution. They travel between sites, so that rights at any one site count. What the
 * certificate says never changes; a lot's state does, with a reason.
 */
import type {
  ChangeStandardState,
  CreateStandard,
  StandardsQuery,
} from '../../../shared/contracts/standards.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import type { StandardState } from '../../../shared/contracts/vocabulary.ts';
import { Standard } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { standardPolicy } from './policy.ts';
import { countStandards, selectStandards, type StandardRow } from './queries.ts';

const codeTaken = {
  standards_code_key: 'standards.code-taken',
  standards_code_lower_key: 'standards.code-taken',
} as const;

function authoriseSomewhere(actor: Actor, action: keyof typeof standardPolicy): void {
  if (!maySomewhere(standardPolicy, action, actor)) throw new AppError('standards.forbidden');
}

export async function listStandards(
  parts: Parts,
  actor: Actor,
  query: StandardsQuery,
): Promise<ListOf<StandardRow>> {
  authoriseSomewhere(actor, 'read');
  const after = readCursor(query.cursor, ['text']);
  const filter = { standardId: null, state: query.state ?? null, pattern: containsPattern(query.q) };
  const [found, total] = await Promise.all([
    selectStandards(parts, filter, after, query.limit + 1),
    countStandards(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.code.toLowerCase()]);
  return { items: rows, total, nextCursor };
}

export async function readStandard(parts: Parts, actor: Actor, id: number): Promise<StandardRow> {
  authoriseSomewhere(actor, 'read');
  const [row] = await selectStandards(parts, { standardId: id, state: null, pattern: null }, null, 1);
  if (!row) throw new AppError('standards.not-found');
  return row;
}

/** A lot arrives quarantined: somebody reads its certificate against the bottle before it is released. */
const onArrival = { state: 'quarantined', stateReason: 'Registered, not released yet.' } as const;

export async function createStandard(
  parts: Parts,
  actor: Actor,
  input: CreateStandard,
): Promise<StandardRow> {
  authoriseSomewhere(actor, 'create');
  const id = await refusingByConstraint(codeTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const lot = await Standard.create(
        { ...input, ...onArrival, stateChangedAt: parts.clock.now() },
        { transaction },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: 'standards.created',
        objectKind: 'standards',
        objectId: lot.id,
        objectVersion: lot.version,
        siteId: null,
        newValue: { ...input, state: lot.state },
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'standards', id: lot.id, kind: 'created' }, null),
      );
      return lot.id;
    }),
  );
  return readStandard(parts, actor, id);
}

const actionTowards = {
  released: 'release',
  quarantined: 'quarantine',
  recalled: 'recall',
} as const satisfies Record<StandardState, keyof typeof standardPolicy>;

export async function changeStandardState(
  parts: Parts,
  actor: Actor,
  id: number,
  input: ChangeStandardState,
): Promise<StandardRow> {
  authoriseSomewhere(actor, actionTowards[input.state]);
  await inTransaction(parts.sequelize, async (transaction) => {
    const lot = await Standard.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!lot) throw new AppError('standards.not-found');
    if (lot.version !== input.version) throw new AppError('standards.changed-meanwhile');
    const before = { state: lot.state, stateReason: lot.stateReason };
    if (before.state === input.state) return;
    if (before.state === 'recalled') throw new AppError('standards.state-impossible');
    const after = { state: input.state, stateReason: input.reason };
    await lot.update({ ...after, stateChangedAt: parts.clock.now() }, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: `standards.${input.state}`,
      objectKind: 'standards',
      objectId: id,
      objectVersion: lot.version,
      siteId: null,
      oldValue: before,
      newValue: after,
      reason: input.reason,
    });
    transaction.afterCommit(() => parts.broadcast.changed({ slice: 'standards', id, kind: 'changed' }, null));
  });
  return readStandard(parts, actor, id);
}

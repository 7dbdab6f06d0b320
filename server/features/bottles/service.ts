/** Bottles of a lot, from the shelf to the drain. A bottle's time begins when it is opened; nothing is poured back. */
import type {
  BottlesQuery,
  DiscardBottle,
  ReceiveBottles,
  SetRemaining,
} from '../../../shared/contracts/bottles.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { Bottle, Site, Standard } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { bottlePolicy } from './policy.ts';
import { isBottleUsable, mayHandleBottle } from './presenter.ts';
import {
  countBottles,
  lastBottleNumber,
  selectBottles,
  type BottleFilter,
  type BottleRow,
} from './queries.ts';

const codeTaken = {
  bottles_code_key: 'bottles.code-taken',
  bottles_code_lower_key: 'bottles.code-taken',
} as const;
const dayMs = 86_400_000;
const dayOf = (at: Date): string => at.toISOString().slice(0, 10);

const everything: BottleFilter = {
  siteIds: null,
  bottleId: null,
  standardId: null,
  siteId: null,
  usableOn: null,
  pattern: null,
};

export async function listBottles(
  parts: Parts,
  actor: Actor,
  query: BottlesQuery,
): Promise<ListOf<BottleRow>> {
  if (!maySomewhere(bottlePolicy, 'read', actor)) throw new AppError('bottles.forbidden');
  const after = readCursor(query.cursor, ['text']);
  const filter: BottleFilter = {
    ...everything,
    siteIds: readableSites(actor),
    standardId: query.standardId ?? null,
    siteId: query.siteId ?? null,
    usableOn: query.usable === '1' ? dayOf(parts.clock.now()) : null,
    pattern: containsPattern(query.q),
  };
  const [found, total] = await Promise.all([
    selectBottles(parts, filter, after, query.limit + 1),
    countBottles(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.code.toLowerCase()]);
  return { items: rows, total, nextCursor };
}

export async function readBottle(parts: Parts, actor: Actor, id: number): Promise<BottleRow> {
  const filter = { ...everything, siteIds: readableSites(actor), bottleId: id };
  const [row] = await selectBottles(parts, filter, null, 1);
  if (!row || !maySomewhere(bottlePolicy, 'read', actor)) throw new AppError('bottles.not-found');
  return row;
}

async function authoriseSite(
  actor: Actor,
  siteId: number | null,
  transaction: OpenTransaction,
): Promise<void> {
  const readable = readableSites(actor);
  const isKnown = siteId === null || (await Site.findByPk(siteId, { transaction })) !== null;
  if (!isKnown || (siteId !== null && readable !== null && !readable.includes(siteId)))
    throw new AppError('sites.not-found');
  if (!mayHandleBottle('receive', actor, siteId)) throw new AppError('bottles.forbidden');
}

/** Numbers go on from the last bottle of the lot; the lot is locked, so that two deliveries never share one. */
export async function receiveBottles(
  parts: Parts,
  actor: Actor,
  input: ReceiveBottles,
): Promise<BottleRow[]> {
  const { standardId, siteId, count, volumeMl } = input;
  const ids = await refusingByConstraint(codeTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      await authoriseSite(actor, siteId, transaction);
      const lot = await Standard.findByPk(standardId, { transaction, lock: transaction.LOCK.UPDATE });
      if (!lot) throw new AppError('standards.not-found');
      const last = await lastBottleNumber(parts, transaction, standardId);
      const codes = Array.from(
        { length: count },
        (_, index) => `${lot.code}/${String(last + index + 1).padStart(2, '0')}`,
      );
      const unopened = {
        openedAt: null,
        openedBy: null,
        useByOn: null,
        discardedAt: null,
        discardedReason: null,
      };
      const made = await Bottle.bulkCreate(
        codes.map((code) => ({ code, standardId, siteId, volumeMl, remainingMl: volumeMl, ...unopened })),
        { transaction, returning: true },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: 'bottles.received',
        objectKind: 'standards',
        objectId: standardId,
        siteId,
        newValue: { codes, volumeMl },
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'bottles', id: made[0]!.id, kind: 'created' }, siteId),
      );
      return made.map((bottle) => bottle.id);
    }),
  );
  return Promise.all(ids.map((id) => readBottle(parts, actor, id)));
}

interface LockedBottle {
  bottle: Bottle;
  lot: Standard;
}

async function lockBottle(
  transaction: OpenTransaction,
  actor: Actor,
  action: keyof typeof bottlePolicy,
  id: number,
  seenVersion: number,
): Promise<LockedBottle> {
  const bottle = await Bottle.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  const readable = readableSites(actor);
  const isReadable = bottle && (bottle.siteId === null || !readable || readable.includes(bottle.siteId));
  if (!bottle || !isReadable) throw new AppError('bottles.not-found');
  if (!mayHandleBottle(action, actor, bottle.siteId)) throw new AppError('bottles.forbidden');
  if (bottle.version !== seenVersion) throw new AppError('bottles.changed-meanwhile');
  if (bottle.discardedAt !== null) throw new AppError('bottles.discarded');
  const lot = (await Standard.findByPk(bottle.standardId, { transaction }))!;
  return { bottle, lot };
}

interface BottleChange {
  action: string;
  oldValue: Partial<Bottle>;
  newValue: Partial<Bottle>;
  reason?: string;
}

async function storeChange(
  parts: Parts,
  transaction: OpenTransaction,
  actor: Actor,
  bottle: Bottle,
  change: BottleChange,
): Promise<void> {
  await bottle.update(change.newValue, { transaction });
  await recordAuditEvent(parts, transaction, actor, {
    ...change,
    objectKind: 'bottles',
    objectId: bottle.id,
    objectVersion: bottle.version,
    siteId: bottle.siteId,
  });
  transaction.afterCommit(() =>
    parts.broadcast.changed({ slice: 'bottles', id: bottle.id, kind: 'changed' }, bottle.siteId),
  );
}

/** The earlier of the lot's expiry and the time after opening. */
export function useByAfterOpening(openedAt: Date, lifeDays: number | null, lotExpiresOn: string): string {
  if (lifeDays === null) return lotExpiresOn;
  const ends = dayOf(new Date(openedAt.getTime() + lifeDays * dayMs));
  return ends < lotExpiresOn ? ends : lotExpiresOn;
}

export async function openBottle(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { version: number },
): Promise<BottleRow> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const { bottle, lot } = await lockBottle(transaction, actor, 'open', id, input.version);
    if (bottle.openedAt !== null) throw new AppError('bottles.opened-already');
    const openedAt = parts.clock.now();
    const usability = { ...bottle.get(), lotState: lot.state, lotExpiresOn: lot.expiresOn };
    if (!isBottleUsable(usability, dayOf(openedAt))) throw new AppError('bottles.unusable');
    const useByOn = useByAfterOpening(openedAt, lot.openedLifeDays, lot.expiresOn);
    await storeChange(parts, transaction, actor, bottle, {
      action: 'bottles.opened',
      oldValue: { openedAt: null, useByOn: bottle.useByOn },
      newValue: { openedAt, openedBy: actor.userId, useByOn },
    });
  });
  return readBottle(parts, actor, id);
}

export async function setRemaining(
  parts: Parts,
  actor: Actor,
  id: number,
  input: SetRemaining,
): Promise<BottleRow> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const { bottle } = await lockBottle(transaction, actor, 'setRemaining', id, input.version);
    if (bottle.openedAt === null) throw new AppError('bottles.not-open');
    if (input.remainingMl === bottle.remainingMl) return;
    if (input.remainingMl > bottle.remainingMl) {
      const message = `It held ${bottle.remainingMl} mL before, and nothing is poured back. Write what is left now.`;
      throw new AppError('request.invalid', { issues: [{ path: 'remainingMl', message }] });
    }
    await storeChange(parts, transaction, actor, bottle, {
      action: 'bottles.used',
      oldValue: { remainingMl: bottle.remainingMl },
      newValue: { remainingMl: input.remainingMl },
    });
  });
  return readBottle(parts, actor, id);
}

export async function discardBottle(
  parts: Parts,
  actor: Actor,
  id: number,
  { reason, version }: DiscardBottle,
): Promise<BottleRow> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const { bottle } = await lockBottle(transaction, actor, 'discard', id, version);
    await storeChange(parts, transaction, actor, bottle, {
      action: 'bottles.discarded',
      oldValue: { discardedAt: null, remainingMl: bottle.remainingMl },
      newValue: { discardedAt: parts.clock.now(), discardedReason: reason },
      reason,
    });
  });
  return readBottle(parts, actor, id);
}

/** Work prompts: raised when a calibration is due soon or overdue, closed when it is done or the probe leaves. */
import { Op } from 'sequelize';
import type { z } from 'zod';
import type { promptsQuery } from '../../../shared/contracts/prompts.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { Prompt } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import { queueMail } from '../../mail/outbox.ts';
import type { Parts } from '../../parts.ts';
import { readSetting } from '../settings/service.ts';
import { promptFor } from './due.ts';
import { promptMail } from './mail-text.ts';
import {
  countPrompts,
  selectDueProbes,
  selectManagers,
  selectPrompts,
  type DueRow,
  type PromptFilter,
  type PromptRow,
} from './queries.ts';

export async function listPrompts(
  parts: Parts,
  actor: Actor,
  query: z.output<typeof promptsQuery>,
): Promise<ListOf<PromptRow>> {
  const after = readCursor(query.cursor, ['text', 'integer']);
  const filter: PromptFilter = {
    siteIds: readableSites(actor),
    siteId: query.siteId ?? null,
    isOpen: query.open !== undefined,
    pattern: containsPattern(query.q),
  };
  const [found, total] = await Promise.all([
    selectPrompts(parts, filter, after, query.limit + 1),
    countPrompts(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.dueOn, row.id]);
  return { items: rows, total, nextCursor };
}

/** The prompt a probe should have now. */
interface Wanted {
  kind: Prompt['kind'];
  due: DueRow & { dueOn: string };
}

function wantedOf(due: DueRow | undefined, dueSoonDays: number): Wanted | null {
  if (!due || due.dueOn === null) return null;
  const kind = promptFor(due.dueOn, due.today, dueSoonDays);
  return kind && { kind, due: { ...due, dueOn: due.dueOn } };
}

const isSame = (open: Prompt, wanted: Wanted | null): boolean =>
  wanted !== null &&
  open.kind === wanted.kind &&
  open.dueOn === wanted.due.dueOn &&
  open.pointId === wanted.due.pointId;

/**
 * Brings the prompts of one probe in line with its due date: closes what no longer holds, raises what does, once. Call
 * it inside the transaction that changed the due date or the place; people hear of it when that is durable.
 */
export async function refreshPrompts(
  parts: Parts,
  transaction: OpenTransaction,
  probeId: number,
): Promise<void> {
  const now = parts.clock.now();
  const { dueSoonDays } = await readSetting('due-dates');
  const [due] = await selectDueProbes(parts, now, probeId, transaction);
  const wanted = wantedOf(due, dueSoonDays);
  const open = await Prompt.findAll({
    where: { probeId, closedAt: null },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  const ended = open.filter((prompt) => !isSame(prompt, wanted));
  if (ended.length > 0)
    await Prompt.update({ closedAt: now }, { where: { id: ended.map(({ id }) => id) }, transaction });
  const siteIds = new Set(ended.map(({ siteId }) => siteId));
  if (wanted && ended.length === open.length && (await raise(parts, transaction, wanted, now)))
    siteIds.add(wanted.due.siteId);
  transaction.afterCommit(() => {
    for (const siteId of siteIds)
      parts.broadcast.changed({ slice: 'prompts', id: probeId, kind: 'changed' }, siteId);
  });
}

/** False when another server has just raised it: one prompt of a kind is open per probe. */
async function raise(
  parts: Parts,
  transaction: OpenTransaction,
  { kind, due }: Wanted,
  now: Date,
): Promise<boolean> {
  const fact = { kind, dueOn: due.dueOn, probeId: due.probeId, pointId: due.pointId, siteId: due.siteId };
  await Prompt.bulkCreate([{ ...fact, raisedAt: now, closedAt: null }], {
    ignoreDuplicates: true,
    transaction,
  });
  const isOurs = await Prompt.findOne({
    where: { ...fact, closedAt: null, raisedAt: { [Op.eq]: now } },
    transaction,
  });
  if (!isOurs) return false;
  for (const person of await selectManagers(parts, due.siteId, due.today, transaction))
    await queueMail(parts, transaction, {
      to: person.email,
      kind: `prompts.${kind}`,
      dedupeKey: `prompts.${kind}:${due.probeId}:${due.dueOn}:${person.id}`,
      ...promptMail(kind, due, person.name, parts.config.publicUrl),
    });
  return true;
}

/** Finds every probe whose prompts are not what its due date asks for, and sets them right one by one. */
export async function refreshAllPrompts(parts: Parts): Promise<number> {
  const { dueSoonDays } = await readSetting('due-dates');
  const due = await selectDueProbes(parts, parts.clock.now(), null, null);
  const open = await Prompt.findAll({ where: { closedAt: null } });
  const openOf = new Map<number, Prompt[]>();
  for (const prompt of open) openOf.set(prompt.probeId, [...(openOf.get(prompt.probeId) ?? []), prompt]);
  const standing = new Map(due.map((row) => [row.probeId, row]));
  let changed = 0;
  for (const probeId of new Set([...standing.keys(), ...openOf.keys()])) {
    const wanted = wantedOf(standing.get(probeId), dueSoonDays);
    const now = openOf.get(probeId) ?? [];
    const isRight = wanted === null ? now.length === 0 : now.length === 1 && isSame(now[0]!, wanted);
    if (isRight) continue;
    changed += 1;
    await inTransaction(parts.sequelize, (transaction) => refreshPrompts(parts, transaction, probeId));
  }
  return changed;
}

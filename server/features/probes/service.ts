/** Probes: registered once, changed with a reason, never deleted. History belongs to the probe. */
import type { ProbesQuery } from '../../../shared/contracts/probes.ts';
import type { ListOf, ListQuery } from '../../../shared/contracts/common.ts';
import { Probe, ProbeEvent } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { activeDeviceOf } from '../devices/service.ts';
import { judgeProbes } from '../readings/service.ts';
import type { Verdict } from '../readings/verdicts.ts';
import { probePolicy } from './policy.ts';
import type { WholeProbe } from './presenter.ts';
import {
  countProbes,
  countTimeline,
  cursorKindOf,
  selectCellConstants,
  selectPlacements,
  selectProbes,
  selectTimeline,
  type ProbeFilter,
  type ProbeListRow,
  type TimelineRow,
} from './queries.ts';

export const probeCodes = { notFound: 'probes.not-found', forbidden: 'probes.forbidden' } as const;
const noFilter: ProbeFilter = {
  siteIds: null,
  siteId: null,
  probeIds: null,
  kind: null,
  status: null,
  pattern: null,
};

/** The site where a probe is kept; null when there is no such probe. */
export async function siteOfProbe(_parts: Pick<Parts, 'sequelize'>, probeId: number): Promise<number | null> {
  const probe = await Probe.findByPk(probeId, { attributes: ['siteId'] });
  return probe?.siteId ?? null;
}

export interface JudgedRow {
  row: ProbeListRow;
  verdict: Verdict;
}

/** Rows with their verdicts, which are asked for all at once. */
async function judged(parts: Parts, rows: ProbeListRow[], perProbe?: number): Promise<JudgedRow[]> {
  const ids = rows.map((row) => row.id);
  const verdicts = await judgeProbes(parts, ids, perProbe);
  return rows.map((row) => ({ row, verdict: verdicts.get(row.id)! }));
}

export async function listProbes(parts: Parts, actor: Actor, query: ProbesQuery): Promise<ListOf<JudgedRow>> {
  const after = readCursor(query.cursor, [cursorKindOf(query.sort), 'integer']);
  const filter: ProbeFilter = {
    ...noFilter,
    siteIds: readableSites(actor),
    siteId: query.siteId ?? null,
    kind: query.kind ?? null,
    status: query.status ?? null,
    pattern: containsPattern(query.q),
  };
  if (query.trust) return listByTrust(parts, filter, query, after);
  const [found, total] = await Promise.all([
    selectProbes(parts, filter, query.sort, after, query.limit + 1),
    countProbes(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, keyOf);
  return { items: await judged(parts, rows), total, nextCursor };
}

const keyOf = (row: ProbeListRow) => [row.sortKey, row.id];

/** Trust is judged now, not stored: all that match otherwise are judged, in one go, and then cut into pages. */
async function listByTrust(
  parts: Parts,
  filter: ProbeFilter,
  query: ProbesQuery,
  after: (string | number)[] | null,
): Promise<ListOf<JudgedRow>> {
  // One comparison judges; what the strip shows besides is read for the page alone.
  const all = await judged(parts, await selectProbes(parts, filter, query.sort, null, null), 1);
  const matching = all.filter(({ verdict }) => verdict.trust.level === query.trust);
  const isDescending = query.sort.startsWith('-');
  const isBeyond = ({ row }: JudgedRow): boolean => {
    if (!after) return true;
    const [key, id] = after as [string | number, number];
    const order = row.sortKey === key ? row.id - id : row.sortKey > key ? 1 : -1;
    return isDescending ? order < 0 : order > 0;
  };
  const { rows, nextCursor } = pageOf(matching.filter(isBeyond), query.limit, ({ row }) => keyOf(row));
  const shown = await judged(
    parts,
    rows.map(({ row }) => row),
  );
  return { items: shown, total: matching.length, nextCursor };
}

/** One row of a probe the person may read; another site's is not to be told from a missing one. */
async function readRow(parts: Parts, actor: Actor, id: number): Promise<ProbeListRow> {
  const [row] = await selectProbes(parts, { ...noFilter, probeIds: [id] }, 'tag', null, 1);
  if (!row) throw new AppError('probes.not-found');
  authorise(probePolicy, 'read', actor, row.siteId, probeCodes);
  return row;
}

export async function readProbe(parts: Parts, actor: Actor, id: number): Promise<WholeProbe> {
  const row = await readRow(parts, actor, id);
  const [verdicts, device, placements, cellConstants] = await Promise.all([
    judgeProbes(parts, [id]),
    activeDeviceOf(parts, id),
    selectPlacements(parts, id),
    selectCellConstants(parts, id),
  ]);
  return { row, verdict: verdicts.get(id)!, device, placements, cellConstants };
}

export async function listTimeline(
  parts: Parts,
  actor: Actor,
  id: number,
  query: ListQuery,
): Promise<ListOf<TimelineRow>> {
  const after = readCursor(query.cursor, ['integer', 'text', 'integer']);
  await readRow(parts, actor, id);
  const [found, total] = await Promise.all([
    selectTimeline(parts, id, after, query.limit + 1),
    countTimeline(parts, id),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.atUs, row.source, row.id]);
  return { items: rows, total, nextCursor };
}

/** A probe locked for change by somebody who may do it; `seenVersion` guards against overwriting. */
export async function lockProbe(
  transaction: OpenTransaction,
  actor: Actor,
  action: keyof typeof probePolicy,
  id: number,
  seenVersion: number,
): Promise<Probe> {
  const probe = await Probe.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  if (!probe) throw new AppError('probes.not-found');
  authorise(probePolicy, action, actor, probe.siteId, probeCodes);
  if (probe.status === 'retired') throw new AppError('probes.retired');
  if (probe.version !== seenVersion) throw new AppError('probes.changed-meanwhile');
  return probe;
}

/** Adds a line to a probe's timeline. */
export async function addEvent(
  transaction: OpenTransaction,
  probeId: number,
  kind: ProbeEvent['kind'],
  more: { at: Date; userId: number; pointId?: number; detail?: Record<string, unknown> },
): Promise<ProbeEvent> {
  const { at, userId, pointId = null, detail = {} } = more;
  return ProbeEvent.create({ kind, detail, at, probeId, pointId, userId }, { transaction });
}

/** Writes a note into the timeline; of a retired probe too. */
export async function addNote(parts: Parts, actor: Actor, id: number, text: string): Promise<TimelineRow> {
  const row = await readRow(parts, actor, id);
  authorise(probePolicy, 'addNote', actor, row.siteId, probeCodes);
  const now = parts.clock.now();
  const event = await inTransaction(parts.sequelize, async (transaction) => {
    const note = await addEvent(transaction, id, 'note', {
      at: now,
      userId: actor.userId,
      detail: { text },
    });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'probes.note-added',
      objectKind: 'probes',
      objectId: id,
      siteId: row.siteId,
      newValue: { eventId: note.id, text },
    });
    transaction.afterCommit(() =>
      parts.broadcast.changed({ slice: 'probes', id, kind: 'changed' }, row.siteId),
    );
    return note;
  });
  return {
    source: 'event',
    id: event.id,
    at: event.at,
    atUs: event.at.getTime() * 1000,
    kind: 'note',
    detail: event.detail,
    pointId: null,
    pointName: null,
    by: actor.name,
    isValid: null,
    earlierErrorPercent: null,
  };
}

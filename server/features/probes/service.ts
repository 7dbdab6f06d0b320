/** Probes: registered once, changed with a reason, never deleted. History belongs to the probe. */
import type { ChangeProbe, ProbesQuery, RegisterProbe } from '../../../shared/contracts/probes.ts';
import type { ListOf, ListQuery } from '../../../shared/contracts/common.ts';
import { CellConstant, Probe, ProbeEvent, Site } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { changesBetween } from '../../lib/changes.ts';
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
const siteCodes = { notFound: 'sites.not-found', forbidden: 'probes.forbidden' } as const;
const taken = {
  probes_serial_key: 'probes.serial-taken',
  probes_serial_lower_key: 'probes.serial-taken',
  probes_tag_key: 'probes.tag-taken',
  probes_tag_lower_key: 'probes.tag-taken',
} as const;
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
async function judged(parts: Parts, rows: ProbeListRow[]): Promise<JudgedRow[]> {
  const verdicts = await judgeProbes(
    parts,
    rows.map((row) => row.id),
  );
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
  const all = await judged(parts, await selectProbes(parts, filter, query.sort, null, null));
  const matching = all.filter(({ verdict }) => verdict.trust.level === query.trust);
  const isDescending = query.sort.startsWith('-');
  const isBeyond = ({ row }: JudgedRow): boolean => {
    if (!after) return true;
    const [key, id] = after as [string | number, number];
    const order = row.sortKey === key ? row.id - id : row.sortKey > key ? 1 : -1;
    return isDescending ? order < 0 : order > 0;
  };
  const { rows, nextCursor } = pageOf(matching.filter(isBeyond), query.limit, ({ row }) => keyOf(row));
  return { items: rows, total: matching.length, nextCursor };
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

export async function registerProbe(parts: Parts, actor: Actor, input: RegisterProbe): Promise<WholeProbe> {
  authorise(probePolicy, 'register', actor, input.siteId, siteCodes);
  if (!(await Site.findOne({ where: { id: input.siteId, retiredAt: null } })))
    throw new AppError('sites.not-found');
  const now = parts.clock.now();
  const id = await refusingByConstraint(taken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await Probe.create(
        {
          ...input,
          notes: input.notes ?? '',
          cellConstantPerCm: input.nominalCellConstantPerCm,
          status: 'spare',
          retiredAt: null,
          retiredReason: null,
        },
        { transaction },
      );
      await recordCellConstant(transaction, probe, { at: now, userId: actor.userId, reason: null });
      await addEvent(transaction, probe.id, 'registered', { at: now, userId: actor.userId });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.registered',
        objectKind: 'probes',
        objectId: probe.id,
        objectVersion: probe.version,
        siteId: probe.siteId,
        newValue: input,
      });
      transaction.afterCommit(() => {
        parts.broadcast.changed({ slice: 'probes', id: probe.id, kind: 'created' }, probe.siteId);
        parts.broadcast.changed({ slice: 'sites', id: probe.siteId, kind: 'changed' }, probe.siteId);
      });
      return probe.id;
    }),
  );
  return readProbe(parts, actor, id);
}

/** The value on the nameplate, in use until a calibration finds a better one. */
async function recordCellConstant(
  transaction: OpenTransaction,
  probe: Probe,
  { at, userId, reason }: { at: Date; userId: number; reason: string | null },
): Promise<void> {
  await CellConstant.create(
    {
      cellConstantPerCm: probe.cellConstantPerCm,
      fromAt: at,
      origin: 'registered',
      reason,
      probeId: probe.id,
      userId,
    },
    { transaction },
  );
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

/**
 * Corrects the nameplate. Until a calibration or the device has set another value, the cell constant in use is
 * the nominal one, and follows its correction.
 */
async function followNominal(transaction: OpenTransaction, probe: Probe): Promise<boolean> {
  const others = await CellConstant.count({
    where: { probeId: probe.id, origin: ['calibration', 'device-reported'] },
    transaction,
  });
  if (others > 0) return false;
  probe.cellConstantPerCm = probe.nominalCellConstantPerCm;
  return true;
}

export async function changeProbe(
  parts: Parts,
  actor: Actor,
  id: number,
  { reason, version, notes, ...rest }: ChangeProbe,
): Promise<WholeProbe> {
  const patch = notes === undefined ? rest : { ...rest, notes: notes ?? '' };
  const now = parts.clock.now();
  await refusingByConstraint(taken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await lockProbe(transaction, actor, 'change', id, version);
      const changes = changesBetween(probe.get(), patch);
      if (!changes) return;
      probe.set(changes.newValue);
      refuseEmptyRange(probe);
      const isCorrected =
        probe.changed('nominalCellConstantPerCm') && (await followNominal(transaction, probe));
      await probe.save({ transaction });
      if (isCorrected)
        await recordCellConstant(transaction, probe, { at: now, userId: actor.userId, reason });
      await addEvent(transaction, id, 'settings-changed', {
        at: now,
        userId: actor.userId,
        detail: { reason, ...changes },
      });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.changed',
        objectKind: 'probes',
        objectId: id,
        objectVersion: probe.version,
        siteId: probe.siteId,
        ...changes,
        reason,
      });
      transaction.afterCommit(() => {
        parts.broadcast.changed({ slice: 'probes', id, kind: 'changed' }, probe.siteId);
        parts.broadcast.changed({ slice: 'readings', id, kind: 'changed' }, probe.siteId);
      });
    }),
  );
  return readProbe(parts, actor, id);
}

/** The contract sees only what is sent; one end of the range may be sent alone. */
function refuseEmptyRange(probe: Probe): void {
  if (probe.rangeLowUsCm < probe.rangeHighUsCm) return;
  throw new AppError('request.invalid', {
    issues: [{ path: 'rangeHighUsCm', message: 'The range must end above where it starts.' }],
  });
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

/** Measuring points: what a reading there must satisfy. Requirements belong to the point, history to the probe. */
import {
  pointRequirements,
  type ChangePoint,
  type CreatePoint,
  type PointsQuery,
} from '../../../shared/contracts/points.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { Area, Assignment, Hold, Point } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { parsePart } from '../../http/validate.ts';
import { changesBetween } from '../../lib/changes.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { pointPolicy } from './policy.ts';
import {
  countPoints,
  selectPointProbes,
  selectPoints,
  type PointFilter,
  type PointProbeRow,
  type PointRow,
} from './queries.ts';

const codes = { notFound: 'points.not-found', forbidden: 'points.forbidden' } as const;
const areaCodes = { notFound: 'areas.not-found', forbidden: 'points.forbidden' } as const;
const codeTaken = {
  points_code_key: 'points.code-taken',
  points_code_lower_key: 'points.code-taken',
} as const;

const everything: Omit<PointFilter, 'now'> = {
  siteIds: null,
  siteId: null,
  areaId: null,
  pointId: null,
  pattern: null,
  onlyFree: false,
  withRetired: true,
};

export async function listPoints(parts: Parts, actor: Actor, query: PointsQuery): Promise<ListOf<PointRow>> {
  const after = readCursor(query.cursor, ['text', 'integer', 'integer', 'integer', 'text']);
  const filter: PointFilter = {
    ...everything,
    siteIds: readableSites(actor),
    siteId: query.siteId ?? null,
    areaId: query.areaId ?? null,
    pattern: containsPattern(query.q),
    onlyFree: query.free === '1',
    withRetired: query.retired === '1',
    now: parts.clock.now(),
  };
  const [found, total] = await Promise.all([
    selectPoints(parts, filter, after, query.limit + 1),
    countPoints(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [
    row.siteSort,
    row.siteId,
    row.areaPosition,
    row.areaId,
    row.code.toLowerCase(),
  ]);
  return { items: rows, total, nextCursor };
}

export async function readPoint(parts: Parts, actor: Actor, id: number): Promise<PointRow> {
  const filter = { ...everything, pointId: id, now: parts.clock.now() };
  const [row] = await selectPoints(parts, filter, null, 1);
  if (!row) throw new AppError('points.not-found');
  authorise(pointPolicy, 'read', actor, row.siteId, codes);
  return row;
}

/** The probes that stood at a point: who reads the point may read them. */
export async function listPointProbes(parts: Parts, actor: Actor, id: number): Promise<PointProbeRow[]> {
  await readPoint(parts, actor, id);
  return selectPointProbes(parts, id);
}

/** A point locked for change, with its site. */
export interface LockedPoint {
  point: Point;
  siteId: number;
}

export async function lockPoint(transaction: OpenTransaction, id: number): Promise<LockedPoint> {
  const point = await Point.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  const area = point && (await Area.findByPk(point.areaId, { transaction }));
  if (!point || !area) throw new AppError('points.not-found');
  return { point, siteId: area.siteId };
}

async function lockPointFor(
  transaction: OpenTransaction,
  actor: Actor,
  action: keyof typeof pointPolicy,
  id: number,
  seenVersion?: number,
): Promise<LockedPoint> {
  const locked = await lockPoint(transaction, id);
  authorise(pointPolicy, action, actor, locked.siteId, codes);
  if (locked.point.retiredAt !== null) throw new AppError('points.retired');
  if (seenVersion !== undefined && locked.point.version !== seenVersion)
    throw new AppError('points.changed-meanwhile');
  return locked;
}

/** Sites show how many points they have; a reading's verdict follows its point. */
function announce(
  parts: Parts,
  id: number,
  siteId: number,
  kind: 'created' | 'changed',
  others: readonly ('sites' | 'readings')[],
): void {
  parts.broadcast.changed({ slice: 'points', id, kind }, siteId);
  for (const slice of others)
    parts.broadcast.changed({ slice, id: slice === 'sites' ? siteId : id, kind: 'changed' }, siteId);
}

export async function createPoint(parts: Parts, actor: Actor, input: CreatePoint): Promise<PointRow> {
  const area = await Area.findByPk(input.areaId);
  if (!area) throw new AppError('areas.not-found');
  authorise(pointPolicy, 'create', actor, area.siteId, areaCodes);
  const id = await refusingByConstraint(codeTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const point = await Point.create({ ...input, retiredAt: null }, { transaction });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'points.created',
        objectKind: 'points',
        objectId: point.id,
        objectVersion: point.version,
        siteId: area.siteId,
        newValue: input,
      });
      transaction.afterCommit(() => announce(parts, point.id, area.siteId, 'created', ['sites', 'readings']));
      return point.id;
    }),
  );
  return readPoint(parts, actor, id);
}

/** A point never leaves its site: what was judged there was judged under that site's rules. */
async function refuseForeignArea(
  transaction: OpenTransaction,
  areaId: number | undefined,
  siteId: number,
): Promise<void> {
  if (areaId === undefined) return;
  const area = await Area.findByPk(areaId, { transaction });
  if (!area || area.siteId !== siteId) throw new AppError('areas.not-found');
}

export async function changePoint(
  parts: Parts,
  actor: Actor,
  id: number,
  { reason, version, ...patch }: ChangePoint,
): Promise<PointRow> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const { point, siteId } = await lockPointFor(transaction, actor, 'change', id, version);
    await refuseForeignArea(transaction, patch.areaId, siteId);
    const changes = changesBetween(point.get(), patch);
    if (!changes) return;
    parsePart(pointRequirements, { ...point.get(), ...changes.newValue }, 'body');
    await point.update(changes.newValue, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'points.changed',
      objectKind: 'points',
      objectId: id,
      objectVersion: point.version,
      siteId,
      ...changes,
      reason,
    });
    transaction.afterCommit(() => announce(parts, id, siteId, 'changed', ['sites', 'readings']));
  });
  return readPoint(parts, actor, id);
}

export async function retirePoint(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { reason: string; version: number },
): Promise<PointRow> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const { point, siteId } = await lockPointFor(transaction, actor, 'retire', id, input.version);
    const occupied = await Assignment.findOne({ where: { pointId: id, toAt: null }, transaction });
    if (occupied) throw new AppError('points.occupied');
    const now = parts.clock.now();
    await endHolds(transaction, id, now);
    await point.update({ retiredAt: now }, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'points.retired',
      objectKind: 'points',
      objectId: id,
      objectVersion: point.version,
      siteId,
      oldValue: { retiredAt: null },
      newValue: { retiredAt: now },
      reason: input.reason,
    });
    transaction.afterCommit(() => announce(parts, id, siteId, 'changed', ['sites', 'readings']));
  });
  return readPoint(parts, actor, id);
}

/** Ends whatever is open; a hold that ran out by itself ended when it said it would. */
async function endHolds(transaction: OpenTransaction, pointId: number, now: Date): Promise<void> {
  const open = await Hold.findAll({ where: { pointId, endedAt: null }, transaction });
  for (const hold of open)
    await hold.update({ endedAt: hold.untilAt < now ? hold.untilAt : now }, { transaction });
}

/** A hold is for a maintenance visit, not a way to silence a point. */
const longestHoldHours = 24;

function refuseHoldEnd(untilAt: Date, now: Date): void {
  const latest = now.getTime() + longestHoldHours * 3_600_000;
  if (untilAt > now && untilAt.getTime() <= latest) return;
  throw new AppError('request.invalid', {
    issues: [{ path: 'untilAt', message: `Choose a time within the next ${longestHoldHours} hours.` }],
  });
}

/** Takes a point out of use for maintenance: readings are stored and nobody is alarmed. */
export async function holdPoint(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { reason: string; untilAt: string },
): Promise<PointRow> {
  const now = parts.clock.now();
  const untilAt = new Date(input.untilAt);
  await inTransaction(parts.sequelize, async (transaction) => {
    const { siteId } = await lockPointFor(transaction, actor, 'hold', id);
    refuseHoldEnd(untilAt, now);
    const open = await Hold.findOne({ where: { pointId: id, endedAt: null }, transaction });
    if (open && open.untilAt > now) throw new AppError('points.already-held');
    await endHolds(transaction, id, now);
    await Hold.create(
      { pointId: id, userId: actor.userId, reason: input.reason, fromAt: now, untilAt, endedAt: null },
      { transaction },
    );
    await recordAuditEvent(parts, transaction, actor, {
      action: 'points.held',
      objectKind: 'points',
      objectId: id,
      siteId,
      newValue: { fromAt: now, untilAt },
      reason: input.reason,
    });
    transaction.afterCommit(() => announce(parts, id, siteId, 'changed', ['readings']));
  });
  return readPoint(parts, actor, id);
}

export async function releasePoint(parts: Parts, actor: Actor, id: number): Promise<PointRow> {
  const now = parts.clock.now();
  await inTransaction(parts.sequelize, async (transaction) => {
    const { siteId } = await lockPointFor(transaction, actor, 'release', id);
    const open = await Hold.findOne({ where: { pointId: id, endedAt: null }, transaction });
    if (!open || open.untilAt <= now) throw new AppError('points.not-held');
    await endHolds(transaction, id, now);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'points.released',
      objectKind: 'points',
      objectId: id,
      siteId,
      oldValue: { userId: open.userId, reason: open.reason, fromAt: open.fromAt, untilAt: open.untilAt },
      newValue: { endedAt: now },
    });
    transaction.afterCommit(() => announce(parts, id, siteId, 'changed', ['readings']));
  });
  return readPoint(parts, actor, id);
}

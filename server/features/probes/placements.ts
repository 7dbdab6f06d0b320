/** Where a probe stands: installed, moved, taken out, retired. Credentials and history stay with the probe. */
import type { InstallProbe, MoveProbe, RemoveProbe } from '../../../shared/contracts/probes.ts';
import { Assignment, Device, type Probe } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { withdrawCredentials } from '../devices/service.ts';
import { lockPoint } from '../points/service.ts';
import { refreshPrompts } from '../prompts/service.ts';
import { probePolicy } from './policy.ts';
import type { WholeProbe } from './presenter.ts';
import { addEvent, lockProbe, readProbe } from './service.ts';

const pointCodes = { notFound: 'points.not-found', forbidden: 'probes.forbidden' } as const;
/** Two people at one point at once: the database lets one of them in. */
const overlapping = {
  assignments_point_holds_one_probe: 'points.occupied',
  assignments_probe_at_one_point: 'probes.time-impossible',
  assignments_from_before_to: 'probes.time-impossible',
} as const;

/** The moment stated, or now; never in the future. */
function momentOf(parts: Parts, at: string | undefined): Date {
  const now = parts.clock.now();
  const moment = at === undefined ? now : new Date(at);
  if (moment > now) throw new AppError('probes.time-impossible', { detail: 'The time lies in the future.' });
  return moment;
}

async function lastAssignmentOf(
  transaction: OpenTransaction,
  where: { probeId: number } | { pointId: number },
): Promise<Assignment | null> {
  return Assignment.findOne({ where, order: [['fromAt', 'DESC']], transaction });
}

/** A free point where the actor may install, locked; its site becomes the probe's. */
async function lockFreePoint(
  transaction: OpenTransaction,
  actor: Actor,
  pointId: number,
  at: Date,
): Promise<{ siteId: number; code: string }> {
  const { point, siteId } = await lockPoint(transaction, pointId);
  authorise(probePolicy, 'install', actor, siteId, pointCodes);
  if (point.retiredAt !== null) throw new AppError('points.retired');
  const last = await lastAssignmentOf(transaction, { pointId });
  if (last?.toAt === null) throw new AppError('points.occupied');
  if (last?.toAt && last.toAt > at) {
    throw new AppError('probes.time-impossible', {
      detail: 'Another probe stood at this point at that time.',
    });
  }
  return { siteId, code: point.code };
}

interface Place {
  siteId: number;
  pointId: number | null;
}

/** A probe's verdict, the points it left and came to, and the board all change; every site concerned is told. */
function announce(parts: Parts, probeId: number, places: readonly Place[]): void {
  const { changed } = parts.broadcast;
  for (const { siteId, pointId } of places)
    if (pointId !== null) changed({ slice: 'points', id: pointId, kind: 'changed' }, siteId);
  for (const siteId of new Set(places.map((place) => place.siteId))) {
    changed({ slice: 'probes', id: probeId, kind: 'changed' }, siteId);
    changed({ slice: 'readings', id: probeId, kind: 'changed' }, siteId);
    changed({ slice: 'sites', id: siteId, kind: 'changed' }, siteId);
  }
}

export async function installProbe(
  parts: Parts,
  actor: Actor,
  id: number,
  input: InstallProbe,
): Promise<WholeProbe> {
  const at = momentOf(parts, input.at);
  await refusingByConstraint(overlapping, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await lockProbe(transaction, actor, 'install', id, input.version);
      const last = await lastAssignmentOf(transaction, { probeId: id });
      if (last?.toAt === null) throw new AppError('probes.already-installed');
      if (last?.toAt && last.toAt > at) throw new AppError('probes.time-impossible');
      const point = await lockFreePoint(transaction, actor, input.pointId, at);
      await stand(transaction, actor, probe, input, at);
      const before = { status: probe.status, siteId: probe.siteId };
      await settle(transaction, probe, point.siteId);
      await addEvent(transaction, id, 'installed', {
        at,
        userId: actor.userId,
        pointId: input.pointId,
        detail: { pointCode: point.code, note: input.note },
      });
      await refreshPrompts(parts, transaction, id);
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.installed',
        objectKind: 'probes',
        objectId: id,
        objectVersion: probe.version,
        siteId: point.siteId,
        oldValue: { pointId: null, ...before },
        newValue: {
          pointId: input.pointId,
          at,
          note: input.note,
          status: probe.status,
          siteId: probe.siteId,
        },
        capturedAt: at,
      });
      transaction.afterCommit(() =>
        announce(parts, id, [
          { siteId: before.siteId, pointId: null },
          { siteId: point.siteId, pointId: input.pointId },
        ]),
      );
    }),
  );
  return readProbe(parts, actor, id);
}

async function stand(
  transaction: OpenTransaction,
  actor: Actor,
  probe: Probe,
  input: { pointId: number; note: string | null },
  at: Date,
): Promise<void> {
  await Assignment.create(
    {
      probeId: probe.id,
      pointId: input.pointId,
      fromAt: at,
      toAt: null,
      note: input.note ?? '',
      installedBy: actor.userId,
      removedBy: null,
    },
    { transaction },
  );
}

/** In service at the point's site. Saved even when neither changes, so that the version counts the move. */
async function settle(transaction: OpenTransaction, probe: Probe, siteId: number): Promise<void> {
  probe.set({ status: 'in-service', siteId });
  probe.changed('status', true);
  await probe.save({ transaction });
}

/** The open assignment of an installed probe, closed at `at`. */
async function leave(
  transaction: OpenTransaction,
  actor: Actor,
  probeId: number,
  at: Date,
): Promise<Assignment> {
  const open = await Assignment.findOne({ where: { probeId, toAt: null }, transaction });
  if (!open) throw new AppError('probes.not-installed');
  if (open.fromAt >= at) throw new AppError('probes.time-impossible');
  await open.update({ toAt: at, removedBy: actor.userId }, { transaction });
  return open;
}

/** Out of one point and into another at the same moment. */
export async function moveProbe(
  parts: Parts,
  actor: Actor,
  id: number,
  input: MoveProbe,
): Promise<WholeProbe> {
  const at = momentOf(parts, input.at);
  await refusingByConstraint(overlapping, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await lockProbe(transaction, actor, 'move', id, input.version);
      const left = await leave(transaction, actor, id, at);
      if (left.pointId === input.pointId) throw new AppError('points.occupied');
      const point = await lockFreePoint(transaction, actor, input.pointId, at);
      await stand(transaction, actor, probe, input, at);
      const siteBefore = probe.siteId;
      await settle(transaction, probe, point.siteId);
      await addEvent(transaction, id, 'moved', {
        at,
        userId: actor.userId,
        pointId: input.pointId,
        detail: { fromPointId: left.pointId, pointCode: point.code, reason: input.reason, note: input.note },
      });
      await refreshPrompts(parts, transaction, id);
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.moved',
        objectKind: 'probes',
        objectId: id,
        objectVersion: probe.version,
        siteId: point.siteId,
        oldValue: { pointId: left.pointId, siteId: siteBefore },
        newValue: { pointId: input.pointId, siteId: point.siteId, at, note: input.note },
        reason: input.reason,
        capturedAt: at,
      });
      transaction.afterCommit(() =>
        announce(parts, id, [
          { siteId: siteBefore, pointId: left.pointId },
          { siteId: point.siteId, pointId: input.pointId },
        ]),
      );
    }),
  );
  return readProbe(parts, actor, id);
}

export async function removeProbe(
  parts: Parts,
  actor: Actor,
  id: number,
  input: RemoveProbe,
): Promise<WholeProbe> {
  const at = momentOf(parts, input.at);
  await refusingByConstraint(overlapping, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await lockProbe(transaction, actor, 'remove', id, input.version);
      const left = await leave(transaction, actor, id, at);
      const statusBefore = probe.status;
      await probe.update({ status: 'spare' }, { transaction });
      await addEvent(transaction, id, 'removed', {
        at,
        userId: actor.userId,
        pointId: left.pointId,
        detail: { reason: input.reason },
      });
      await refreshPrompts(parts, transaction, id);
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.removed',
        objectKind: 'probes',
        objectId: id,
        objectVersion: probe.version,
        siteId: probe.siteId,
        oldValue: { pointId: left.pointId, status: statusBefore },
        newValue: { pointId: null, status: probe.status, at },
        reason: input.reason,
        capturedAt: at,
      });
      transaction.afterCommit(() => announce(parts, id, [{ siteId: probe.siteId, pointId: left.pointId }]));
    }),
  );
  return readProbe(parts, actor, id);
}

/** For good: out of its point, its device shut out, its history kept. */
export async function retireProbe(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { reason: string; version: number },
): Promise<WholeProbe> {
  const at = parts.clock.now();
  const { reason } = input;
  await inTransaction(parts.sequelize, async (transaction) => {
    const probe = await lockProbe(transaction, actor, 'retire', id, input.version);
    const isInstalled = await Assignment.findOne({ where: { probeId: id, toAt: null }, transaction });
    const left = isInstalled && (await leave(transaction, actor, id, at));
    const device = await Device.findOne({ where: { probeId: id, revokedAt: null }, transaction });
    const by = { userId: actor.userId, siteId: probe.siteId, reason, at };
    if (device) await withdrawCredentials(parts, transaction, device, by);
    const before = { status: probe.status, pointId: left?.pointId ?? null, device: device?.name ?? null };
    await probe.update({ status: 'retired', retiredAt: at, retiredReason: reason }, { transaction });
    await addEvent(transaction, id, 'retired', {
      at,
      userId: actor.userId,
      ...(left && { pointId: left.pointId }),
      detail: { reason },
    });
    await refreshPrompts(parts, transaction, id);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'probes.retired',
      objectKind: 'probes',
      objectId: id,
      objectVersion: probe.version,
      siteId: probe.siteId,
      oldValue: before,
      newValue: { status: 'retired', pointId: null, device: null, retiredAt: at },
      reason,
    });
    transaction.afterCommit(() =>
      announce(parts, id, [{ siteId: probe.siteId, pointId: left?.pointId ?? null }]),
    );
  });
  return readProbe(parts, actor, id);
}

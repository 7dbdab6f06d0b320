/** Stopping for safety ends a run without penalty; handing it over lets another person go on. Both are recorded. */
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { findActor } from '../sessions/service.ts';
import { renameHoldOfRun } from './holds.ts';
import { calibrationPolicy } from './policy.ts';
import { announce, changeRun, momentOf, type Run } from './runs.ts';

const isManagerOrPerformer = (run: Run, actor: Actor): boolean =>
  run.row.performerId === actor.userId || may(calibrationPolicy, 'review', actor, run.row.siteId);

/** The point stays held as it is: whoever stopped knows why, and nothing says that the probe is back. */
export async function stopCalibration(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { reason: string; capturedAt: string },
): Promise<Run> {
  return changeRun(parts, actor, 'stop', id, async (transaction, run) => {
    const { row } = run;
    if (row.status === 'stopped' && row.stoppedReason === input.reason) return;
    if (row.status !== 'running') throw new AppError('calibrations.not-running');
    if (!isManagerOrPerformer(run, actor)) throw new AppError('calibrations.not-performer');
    const at = momentOf(parts, input.capturedAt, row.startedAt);
    await row.update({ status: 'stopped', stoppedAt: at, stoppedReason: input.reason }, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.stopped',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: row.version,
      siteId: row.siteId,
      oldValue: { status: 'running' },
      newValue: { status: 'stopped', holdId: row.holdId },
      reason: input.reason,
      capturedAt: at,
    });
    announce(parts, transaction, row, 'changed', ['points', 'readings']);
  });
}

export async function handOver(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { toUserId: number; reason: string },
): Promise<Run> {
  const to = await findActor(parts, input.toUserId, actor.source);
  return changeRun(parts, actor, 'handOver', id, async (transaction, run) => {
    const { row } = run;
    if (row.status !== 'running') throw new AppError('calibrations.not-running');
    if (!isManagerOrPerformer(run, actor)) throw new AppError('calibrations.not-performer');
    if (!to || to.userId === row.performerId || !may(calibrationPolicy, 'perform', to, row.siteId))
      throw new AppError('calibrations.hand-over-impossible');
    const before = { performerId: row.performerId, performer: row.performer.name };
    await row.update({ performerId: to.userId }, { transaction });
    await renameHoldOfRun(transaction, run, { id: to.userId, name: to.name });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.handed-over',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: row.version,
      siteId: row.siteId,
      oldValue: before,
      newValue: { performerId: to.userId, performer: to.name },
      reason: input.reason,
    });
    announce(parts, transaction, row, 'changed', ['points', 'readings']);
  });
}

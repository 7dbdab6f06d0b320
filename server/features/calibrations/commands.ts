/**
 * The order to the transmitter. It is written with the signature that asks for it and carried out by a server that is
 * connected to the broker; until the device itself announces the value it is an open item, never an assumption.
 */
import { Device, DeviceCommand } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { takeAbandonedCommands, takeWaitingCommands, type TakenCommand } from './queries.ts';
import { announce, changeRun, type Run } from './runs.ts';
import { isSameConstant } from './same-constant.ts';

export type { TakenCommand } from './queries.ts';

/** Nothing to order when there is no device, or when it works with the value already. */
export async function orderCellConstant(
  parts: Parts,
  transaction: OpenTransaction,
  actor: Actor,
  { row }: Run,
): Promise<boolean> {
  const cellConstantPerCm = row.cellConstantAfterPerCm;
  const device = await Device.findOne({ where: { probeId: row.probeId, revokedAt: null }, transaction });
  if (!device || cellConstantPerCm === null) return false;
  const reported = device.reportedCellConstantPerCm;
  if (reported !== null && isSameConstant(reported, cellConstantPerCm)) return false;
  await DeviceCommand.create(
    {
      what: 'apply-cell-constant',
      cellConstantPerCm,
      state: 'waiting',
      requestedAt: parts.clock.now(),
      deviceId: device.id,
      calibrationId: row.id,
      requestedBy: actor.userId,
    },
    { transaction },
  );
  return true;
}

/** Sends a failed order once more; the first one stays on record. */
export async function repeatCommand(parts: Parts, actor: Actor, id: number): Promise<Run> {
  return changeRun(parts, actor, 'command', id, async (transaction, run) => {
    if (run.command?.state !== 'failed' || !(await orderCellConstant(parts, transaction, actor, run)))
      throw new AppError('calibrations.command-not-open');
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.command-repeated',
      objectKind: 'calibrations',
      objectId: id,
      siteId: run.row.siteId,
      newValue: { cellConstantPerCm: run.row.cellConstantAfterPerCm },
    });
    announce(parts, transaction, run.row, 'changed');
  });
}

/** Orders this server is to send now; nobody else takes them. */
export const takeCommands = (parts: Parts): Promise<TakenCommand[]> =>
  takeWaitingCommands(parts, parts.clock.now());

/** Longer than a device is given to answer and to announce itself. */
const abandonedAfterMs = 120_000;

export async function closeAbandonedCommands(parts: Parts): Promise<void> {
  const sentBefore = new Date(parts.clock.now().getTime() - abandonedAfterMs);
  for (const command of await takeAbandonedCommands(parts, sentBefore))
    await settleCommand(parts, command, {
      isConfirmed: false,
      detail: 'The server stopped before the device answered.',
    });
}

export const reportedCellConstant = async (deviceId: number): Promise<number | null> =>
  (await Device.findByPk(deviceId))?.reportedCellConstantPerCm ?? null;

export { isSameConstant } from './same-constant.ts';

/** Writes down how an order ended, once. */
export async function settleCommand(
  parts: Parts,
  command: TakenCommand,
  { isConfirmed, detail }: { isConfirmed: boolean; detail: string },
): Promise<void> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const row = await DeviceCommand.findByPk(command.id, { transaction, lock: transaction.LOCK.UPDATE });
    if (row?.state !== 'waiting') return;
    const state = isConfirmed ? 'confirmed' : 'failed';
    await row.update({ state, answeredAt: parts.clock.now(), detail }, { transaction });
    const device = { kind: 'device', id: command.deviceId, name: command.deviceName } as const;
    await recordAuditEvent(parts, transaction, device, {
      action: isConfirmed ? 'calibrations.command-confirmed' : 'calibrations.command-failed',
      objectKind: 'calibrations',
      objectId: command.calibrationId,
      siteId: command.siteId,
      newValue: { cellConstantPerCm: command.cellConstantPerCm, state, detail },
    });
    transaction.afterCommit(() => {
      parts.broadcast.changed(
        { slice: 'calibrations', id: command.calibrationId, kind: 'changed' },
        command.siteId,
      );
      for (const slice of ['probes', 'readings'] as const)
        parts.broadcast.changed({ slice, id: command.probeId, kind: 'changed' }, command.siteId);
    });
  });
}

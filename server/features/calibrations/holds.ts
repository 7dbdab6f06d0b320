/** Operators see who works at their point: the run holds it from its third step until the probe is back in place. */
import { Hold } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import { lockPoint } from '../points/service.ts';
import type { Run } from './runs.ts';

/** A hold is for a visit; what takes longer is held anew. */
const longestHoldHours = 24;

const reasonFor = (name: string): string => `being calibrated by ${name}`;

/** Starts the hold at the moment it was captured; one that ran out before it arrived is kept as history. */
export async function holdForRun(
  transaction: OpenTransaction,
  run: Run,
  at: Date,
  untilAt: Date,
  now: Date,
): Promise<void> {
  const { row } = run;
  if (untilAt <= at || untilAt.getTime() > at.getTime() + longestHoldHours * 3_600_000)
    throw new AppError('request.invalid', {
      issues: [
        {
          path: 'data.untilAt',
          message: `Choose a time within ${longestHoldHours} hours of the start of the hold.`,
        },
      ],
    });
  await lockPoint(transaction, row.pointId);
  const fromAt = at < now ? at : now;
  const open = await Hold.findOne({
    where: { pointId: row.pointId, endedAt: null },
    include: ['user'],
    transaction,
  });
  if (open && open.untilAt > now && open.userId !== row.performerId)
    throw new AppError('points.already-held', {
      detail: `${open.user?.name ?? 'Somebody'} holds it: ${open.reason}. Have it released first.`,
    });
  if (open) await open.update({ endedAt: endOf(open, fromAt) }, { transaction });
  const hold = await Hold.create(
    {
      reason: reasonFor(row.performer.name),
      fromAt,
      untilAt,
      endedAt: untilAt <= now ? untilAt : null,
      pointId: row.pointId,
      userId: row.performerId,
    },
    { transaction },
  );
  row.holdId = hold.id;
}

/** Never before it began, never after it ran out by itself. */
function endOf(hold: Hold, at: Date): Date {
  const latest = at < hold.untilAt ? at : hold.untilAt;
  return latest > hold.fromAt ? latest : hold.fromAt;
}

export async function endHoldOfRun(transaction: OpenTransaction, run: Run, at: Date): Promise<boolean> {
  const hold = run.row.holdId === null ? null : await Hold.findByPk(run.row.holdId, { transaction });
  if (!hold || hold.endedAt !== null) return false;
  await hold.update({ endedAt: endOf(hold, at) }, { transaction });
  return true;
}

/** After a hand-over the board names the person who is there now. */
export async function renameHoldOfRun(
  transaction: OpenTransaction,
  run: Run,
  to: { id: number; name: string },
): Promise<void> {
  const hold = run.row.holdId === null ? null : await Hold.findByPk(run.row.holdId, { transaction });
  if (hold?.endedAt === null)
    await hold.update({ userId: to.id, reason: reasonFor(to.name) }, { transaction });
}

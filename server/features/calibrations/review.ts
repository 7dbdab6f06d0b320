/** Review by another person: approved for use, or returned with a reason. Nobody reviews own work. */
import type { ReviewCalibration } from '../../../shared/contracts/calibrations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { bringIntoEffect } from './effect.ts';
import { calibrationPolicy } from './policy.ts';
import { announce, changeRun, codes, readRun, type Run, type Told } from './runs.ts';
import { addSignature, confirmSigner } from './sign.ts';

/** Everybody who captured, finished a step or signed took part in the work. */
export const tookPart = (run: Run, userId: number): boolean =>
  run.row.performerId === userId ||
  [...run.steps, ...run.captures].some((part) => part.userId === userId) ||
  run.signatures.some((signature) => signature.meaning === 'performed' && signature.userId === userId);

function refuseReview(run: Run, actor: Actor): void {
  if (tookPart(run, actor.userId)) throw new AppError('calibrations.own-approval');
  if (run.row.status !== 'signed') throw new AppError('calibrations.not-signed');
  if (run.row.effectiveAt !== null) throw new AppError('calibrations.review-not-needed');
}

export async function reviewCalibration(
  parts: Parts,
  actor: Actor,
  id: number,
  input: ReviewCalibration,
): Promise<Run> {
  const seen = await readRun(actor, id);
  authorise(calibrationPolicy, 'review', actor, seen.row.siteId, codes);
  refuseReview(seen, actor);
  if (input.decision === 'return' && input.reason === null)
    throw new AppError('request.invalid', {
      issues: [{ path: 'reason', message: 'Say what the performer should look at.' }],
    });
  await confirmSigner(parts, actor, input.password);
  return changeRun(parts, actor, 'review', id, async (transaction, run) => {
    refuseReview(run, actor);
    const { row } = run;
    const now = parts.clock.now();
    const isApproved = input.decision === 'approve';
    const told: Told[] =
      isApproved && !run.amends?.isInEffect ? await bringIntoEffect(parts, transaction, actor, run) : [];
    await row.update(isApproved ? { status: 'approved', approvedAt: now } : { status: 'returned' }, {
      transaction,
    });
    await addSignature(transaction, actor, run, {
      meaning: isApproved ? 'approved' : 'returned',
      at: now,
      note: input.reason,
    });
    await recordAuditEvent(parts, transaction, actor, {
      action: isApproved ? 'calibrations.approved' : 'calibrations.returned',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: row.version,
      siteId: row.siteId,
      oldValue: { status: 'signed' },
      newValue: { status: row.status, number: row.number, recordHash: row.recordHash, dueOn: row.dueOn },
      reason: input.reason,
    });
    announce(parts, transaction, row, 'changed', told);
  });
}

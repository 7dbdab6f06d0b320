/** Captured readings: never edited, never deleted; what should not count is excluded with a reason beside it. */
import type { CaptureReading, ExcludeCapture } from '../../../shared/contracts/calibrations.ts';
import { lotReferenceConductivity } from '../../../shared/science/certified-lots.ts';
import { Capture, CaptureExclusion } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { refusingByScience } from '../calculations/service.ts';
import { isSolutionStep } from './order.ts';
import { announce, changeRun, momentOf, requirePerforming, type Run } from './runs.ts';
import { requireCurrent } from './steps.ts';
import { traceReading } from './stream.ts';
import { lotOf } from './lot.ts';

const violated = { captures_key_key: 'calibrations.key-reused' } as const;

export async function captureReading(
  parts: Parts,
  actor: Actor,
  id: number,
  input: CaptureReading,
): Promise<Run> {
  return refusingByConstraint(violated, () =>
    changeRun(parts, actor, 'perform', id, async (transaction, run) => {
      if (await isRepeated(transaction, run, input)) return;
      requirePerforming(run, actor);
      requireCurrent(run, input.step);
      const at = momentOf(parts, input.capturedAt, run.row.startedAt);
      refuseSlip(run, input);
      const origin = await traceReading(transaction, run, input);
      const capture = await Capture.create(
        {
          ...contentOf(input),
          ...origin,
          position: run.captures.filter(({ step }) => step === input.step).length + 1,
          capturedAt: at,
          receivedAt: parts.clock.now(),
          calibrationId: id,
          userId: actor.userId,
        },
        { transaction },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: 'calibrations.reading-captured',
        objectKind: 'calibrations',
        objectId: id,
        siteId: run.row.siteId,
        newValue: { captureId: capture.id, position: capture.position, ...contentOf(input) },
        capturedAt: at,
      });
      announce(parts, transaction, run.row, 'changed');
    }),
  );
}

/** What the person sent, as it is stored. */
const contentOf = (input: CaptureReading) => ({
  key: input.key,
  step: input.step,
  source: input.source,
  conductivityUsCm: input.conductivityUsCm,
  temperatureC: input.temperatureC,
  referenceTemperatureC: input.referenceTemperatureC,
  referenceConductivityUsCm: input.referenceConductivityUsCm,
  isStable: input.isStable,
  isConfirmed: input.isConfirmed,
  boot: input.boot,
  n: input.n,
  clockOffsetMs: input.clockOffsetMs,
});

async function isRepeated(transaction: OpenTransaction, run: Run, input: CaptureReading): Promise<boolean> {
  const known = await Capture.findOne({ where: { key: input.key }, transaction });
  if (!known) return false;
  const isSame =
    known.calibrationId === run.row.id &&
    Object.entries(contentOf(input)).every(([name, value]) => known.get(name) === value);
  if (isSame) return true;
  throw new AppError('calibrations.key-reused');
}

/** A typed value beyond three times the solution, either way, is a slip of unit or point until it is confirmed. */
const magnitudeFactor = 3;

function refuseSlip(run: Run, input: CaptureReading): void {
  if (input.source !== 'typed' || input.isConfirmed || !isSolutionStep(input.step)) return;
  const lot = input.step === 'second-point' ? run.row.secondStandard : run.row.standard;
  if (!lot) return;
  const expected = refusingByScience(() =>
    lotReferenceConductivity({ lot: lotOf(lot), temperatureC: lot.referenceTemperatureC }),
  ).conductivityUsCm;
  const ratio = input.conductivityUsCm / expected;
  if (ratio > magnitudeFactor || ratio < 1 / magnitudeFactor)
    throw new AppError('calibrations.order-of-magnitude', {
      issues: [
        { path: 'conductivityUsCm', message: 'Far from what this solution shows: check unit and point.' },
      ],
    });
}

/** Only while its step is open: once the result is known, no reading is taken out of it. */
export async function excludeCapture(
  parts: Parts,
  actor: Actor,
  id: number,
  captureId: number,
  input: ExcludeCapture,
): Promise<Run> {
  return changeRun(parts, actor, 'perform', id, async (transaction, run) => {
    const capture = run.captures.find((candidate) => candidate.id === captureId);
    if (!capture) throw new AppError('calibrations.capture-not-found');
    const known = await CaptureExclusion.findOne({ where: { key: input.key }, transaction });
    if (known) {
      const isSame = known.captureId === captureId && known.code === input.code && known.note === input.note;
      if (isSame) return;
      throw new AppError('calibrations.key-reused');
    }
    requirePerforming(run, actor);
    requireCurrent(run, capture.step);
    if (capture.exclusion) throw new AppError('calibrations.capture-excluded');
    const at = momentOf(parts, input.capturedAt, run.row.startedAt);
    await CaptureExclusion.create(
      {
        key: input.key,
        code: input.code,
        note: input.note,
        at,
        receivedAt: parts.clock.now(),
        captureId,
        userId: actor.userId,
      },
      { transaction },
    );
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.capture-excluded',
      objectKind: 'calibrations',
      objectId: id,
      siteId: run.row.siteId,
      newValue: { captureId, step: capture.step, position: capture.position, code: input.code },
      reason: input.note,
      capturedAt: at,
    });
    announce(parts, transaction, run.row, 'changed');
  });
}

/** Finishing a step: only the performer, only the current one, only complete; stored as it happens. */
import type { FinishStep, StepData } from '../../../shared/contracts/calibrations.ts';
import type { RunStep } from '../../../shared/contracts/vocabulary.ts';
import { CalibrationStep, ProbeEvent } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { canonicalJson } from '../../lib/hashing.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { takePortion } from './bottle-use.ts';
import { endHoldOfRun, holdForRun } from './holds.ts';
import { isSolutionStep, lacksOf } from './order.ts';
import {
  announce,
  changeRun,
  currentStep,
  momentOf,
  requirePerforming,
  type Run,
  type Told,
} from './runs.ts';
import { isSameConstant } from './same-constant.ts';
import { judge } from './subject.ts';

export async function finishStep(parts: Parts, actor: Actor, id: number, input: FinishStep): Promise<Run> {
  return changeRun(parts, actor, 'perform', id, async (transaction, run) => {
    if (await isRepeated(transaction, run, input)) return;
    requirePerforming(run, actor);
    requireCurrent(run, input.data.step);
    const at = momentOf(parts, input.capturedAt, run.row.startedAt);
    refuseLacks(run, input.data);
    const told = await takeEffect(parts, transaction, actor, run, input.data, at);
    await storeStep(parts, transaction, actor, run, input, at);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.step-finished',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: run.row.version,
      siteId: run.row.siteId,
      newValue: input.data,
      reason: input.data.step === 'decide' ? input.data.reason : null,
      capturedAt: at,
    });
    announce(parts, transaction, run.row, 'changed', told);
  });
}

/** The same deed sent twice is done once; another content under its key is refused. */
async function isRepeated(transaction: OpenTransaction, run: Run, input: FinishStep): Promise<boolean> {
  const known = await CalibrationStep.findOne({ where: { key: input.key }, transaction });
  if (!known) return false;
  const isSame =
    known.calibrationId === run.row.id && canonicalJson(known.data) === canonicalJson(input.data);
  if (isSame) return true;
  throw new AppError('calibrations.key-reused');
}

export function requireCurrent(run: Run, step: RunStep): void {
  const current = currentStep(run);
  if (current === step) return;
  throw new AppError('calibrations.step-order', {
    detail: current === null ? 'Every step is done.' : `The current step is ${current}.`,
  });
}

function refuseLacks(run: Run, data: StepData): void {
  const captures = run.captures.filter(({ step, exclusion }) => step === data.step && !exclusion);
  const issues = lacksOf(data, captures, run.row.procedure.criteria);
  if (issues.length > 0) throw new AppError('calibrations.step-incomplete', { issues });
}

/** The step joins the run, and with it what can now be concluded. */
async function storeStep(
  parts: Parts,
  transaction: OpenTransaction,
  actor: Actor,
  run: Run,
  input: FinishStep,
  at: Date,
): Promise<void> {
  const { row } = run;
  const step = await CalibrationStep.create(
    {
      key: input.key,
      step: input.data.step,
      data: input.data,
      capturedAt: at,
      receivedAt: parts.clock.now(),
      calibrationId: row.id,
      userId: actor.userId,
    },
    { transaction },
  );
  run.steps.push(step);
  row.judgement = await judge(run, transaction);
  row.changed('judgement', true);
  await row.save({ transaction });
}

/** What some steps do beyond being recorded. Answers what else has changed for others. */
async function takeEffect(
  parts: Parts,
  transaction: OpenTransaction,
  actor: Actor,
  run: Run,
  data: StepData,
  at: Date,
): Promise<Told[]> {
  if (data.step === 'identify') refuseOtherProbe(run, data);
  if (data.step === 'pre-checks') run.row.permitNumber = data.permitNumber;
  if (data.step === 'decide') decide(run, data);
  if (data.step === 'hold') {
    await holdForRun(transaction, run, at, new Date(data.untilAt), parts.clock.now());
    return ['points', 'readings'];
  }
  if (data.step === 'reinstall')
    return (await endHoldOfRun(transaction, run, at)) ? ['points', 'readings'] : [];
  if (data.step === 'clean') {
    await recordCleaning(transaction, actor, run, data, at);
    return ['probes'];
  }
  return pourPortion(transaction, actor, run, data.step, at);
}

function refuseOtherProbe(run: Run, data: Extract<StepData, { step: 'identify' }>): void {
  const { probe, cellConstantBeforePerCm } = run.row;
  const isSerial = data.serial.toLowerCase() === probe.serial.toLowerCase();
  const isConstant =
    data.cellConstantPerCm === null || isSameConstant(data.cellConstantPerCm, cellConstantBeforePerCm);
  if (isSerial && isConstant) return;
  const detail = isSerial
    ? `It works with ${data.cellConstantPerCm} cm⁻¹, expected ${cellConstantBeforePerCm} cm⁻¹.`
    : `Serial ${data.serial}, expected ${probe.serial}.`;
  throw new AppError('calibrations.wrong-probe', { detail });
}

/** Adjusting beyond bounds is refused; going against the advice, or a jump, needs its reason. */
function decide(run: Run, data: Extract<StepData, { step: 'decide' }>): void {
  const { row } = run;
  const { advice, cleaned } = row.judgement;
  const inUse = cleaned?.cellConstantPerCm ?? row.cellConstantBeforePerCm;
  if (data.decision === 'leave') {
    if (advice?.decision === 'adjust' && data.reason === null)
      throw new AppError('calibrations.adjustment-reason');
    row.cellConstantAfterPerCm = inUse;
    return;
  }
  if (!advice || advice.decision === 'replace') throw new AppError('calibrations.constant-out-of-bounds');
  if (advice.needsReason && data.reason === null) throw new AppError('calibrations.adjustment-reason');
  row.cellConstantAfterPerCm = advice.proposedCellConstantPerCm;
}

async function recordCleaning(
  transaction: OpenTransaction,
  actor: Actor,
  run: Run,
  data: Extract<StepData, { step: 'clean' }>,
  at: Date,
): Promise<void> {
  const { agent, minutes, note } = data;
  await ProbeEvent.create(
    {
      kind: 'cleaned',
      detail: { name: agent, minutes, note, calibrationId: run.row.id },
      at,
      probeId: run.row.probeId,
      pointId: run.row.pointId,
      userId: actor.userId,
    },
    { transaction },
  );
}

async function pourPortion(
  transaction: OpenTransaction,
  actor: Actor,
  run: Run,
  step: RunStep,
  at: Date,
): Promise<Told[]> {
  const { bottle, standard, probe } = run.row;
  if (!bottle || !isSolutionStep(step) || step === 'second-point') return [];
  await takePortion(transaction, bottle, standard, { kind: probe.kind, userId: actor.userId, at });
  return ['bottles'];
}

import type {
  Calibration,
  CalibrationRecord,
  CalibrationRow,
  Capture,
} from '../../../shared/contracts/calibrations.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { labelOfLot } from '../standards/presenter.ts';
import { lotOf } from './lot.ts';
import { currentStepOf, stepsOfRun, type Decision } from './order.ts';
import { calibrationPolicy } from './policy.ts';
import type { ListedRun } from './queries.ts';
import type { Run } from './runs.ts';

const asInstant = (at: Date | null): string | null => at?.toISOString() ?? null;

export const presentRow = ({ startedUs: _sortKey, ...row }: ListedRun): CalibrationRow => ({
  ...row,
  startedAt: row.startedAt.toISOString(),
  signedAt: asInstant(row.signedAt),
  approvedAt: asInstant(row.approvedAt),
});

function presentAsRow({ row }: Run): CalibrationRow {
  const { judgement, cellConstantAfterPerCm: after } = row;
  return {
    id: row.id,
    number: row.number,
    status: row.status,
    probeId: row.probeId,
    probeTag: row.probe.tag,
    probeSerial: row.probe.serial,
    pointId: row.pointId,
    pointCode: row.point.code,
    pointName: row.point.name,
    siteId: row.siteId,
    siteName: row.site.name,
    lotCode: row.standard.code,
    performerId: row.performerId,
    performer: row.performer.name,
    startedAt: row.startedAt.toISOString(),
    signedAt: asInstant(row.signedAt),
    approvedAt: asInstant(row.approvedAt),
    dueOn: row.dueOn,
    asFoundErrorPercent: judgement.asFound?.errorPercent ?? null,
    cleanedErrorPercent: judgement.cleaned?.errorPercent ?? null,
    asLeftErrorPercent: judgement.asLeft?.errorPercent ?? null,
    outcome: judgement.cleaned?.outcome ?? null,
    isAdjusted: after !== null && after !== row.cellConstantBeforePerCm,
  };
}

interface Progress {
  steps: Calibration['steps'];
  currentStep: Calibration['currentStep'];
}

function presentProgress(run: Run): Progress {
  const done = new Map(run.steps.map((step) => [step.step, step]));
  const decision = (done.get('decide')?.data['decision'] as Decision | undefined) ?? null;
  const steps = stepsOfRun(run.row.procedure.steps, decision);
  const currentStep = run.row.status === 'running' ? currentStepOf(steps, new Set(done.keys())) : null;
  return {
    currentStep,
    steps: steps.map((step) => {
      const finished = done.get(step);
      return {
        step,
        state: finished ? 'done' : step === currentStep ? 'current' : 'waiting',
        capturedAt: asInstant(finished?.capturedAt ?? null),
        receivedAt: asInstant(finished?.receivedAt ?? null),
        by: finished?.user?.name ?? null,
        data: finished?.data ?? null,
      };
    }),
  };
}

const presentCapture = (capture: Run['captures'][number]): Capture => ({
  id: capture.id,
  key: capture.key,
  step: capture.step,
  position: capture.position,
  source: capture.source,
  conductivityUsCm: capture.conductivityUsCm,
  temperatureC: capture.temperatureC,
  referenceTemperatureC: capture.referenceTemperatureC,
  referenceConductivityUsCm: capture.referenceConductivityUsCm,
  isStable: capture.isStable,
  capturedAt: capture.capturedAt.toISOString(),
  receivedAt: capture.receivedAt.toISOString(),
  clockOffsetMs: capture.clockOffsetMs,
  excluded: capture.exclusion
    ? {
        code: capture.exclusion.code,
        note: capture.exclusion.note,
        by: capture.exclusion.user?.name ?? '',
        at: capture.exclusion.at.toISOString(),
      }
    : null,
});

const presentSignatures = (run: Run): Calibration['signatures'] =>
  run.signatures.map((signature) => ({
    userId: signature.userId,
    name: signature.name,
    role: signature.role,
    meaning: signature.meaning,
    statement: signature.statement,
    signedAt: signature.signedAt.toISOString(),
    method: signature.method,
    recordHash: signature.recordHash,
    note: signature.note,
  }));

const labelOf = (lot: Run['row']['standard']): string =>
  labelOfLot({ ...lotOf(lot), product: lot.product, isInHouse: lot.isInHouse });

function presentMeans({ row }: Run): Pick<Calibration, 'lot' | 'secondLot' | 'thermometer' | 'override'> {
  const { standard, secondStandard, thermometer, override } = row;
  return {
    lot: {
      id: standard.id,
      code: standard.code,
      label: labelOf(standard),
      bottleCode: row.bottle?.code ?? null,
    },
    secondLot: secondStandard
      ? { id: secondStandard.id, code: secondStandard.code, label: labelOf(secondStandard) }
      : null,
    thermometer: thermometer
      ? {
          id: thermometer.id,
          code: thermometer.code,
          expandedUncertaintyC: thermometer.expandedUncertainty,
          dueOn: thermometer.dueOn,
        }
      : null,
    override: override && { by: override.by, reason: override.reason },
  };
}

export function presentCalibration(run: Run, actor: Actor): Calibration {
  const { row } = run;
  const progress = presentProgress(run);
  return {
    ...presentAsRow(run),
    key: row.key,
    probeKind: row.probe.kind,
    procedure: {
      id: row.procedure.id,
      code: row.procedure.code,
      name: row.procedure.name,
      version: row.procedure.version,
      criteria: row.procedure.criteria,
    },
    hazardTags: row.point.hazardTags,
    controlNote: row.point.controlNote,
    displayUnit: row.point.displayUnit,
    tolerancePercent: row.tolerancePercent,
    decisionRule: row.decisionRule,
    cellConstantBeforePerCm: row.cellConstantBeforePerCm,
    cellConstantAfterPerCm: row.cellConstantAfterPerCm,
    nominalCellConstantPerCm: row.probe.nominalCellConstantPerCm,
    ...presentMeans(run),
    plan: row.plan,
    ...progress,
    captures: run.captures.map(presentCapture),
    judgement: row.judgement,
    command: run.command && {
      state: run.command.state,
      cellConstantPerCm: run.command.cellConstantPerCm,
      requestedAt: run.command.requestedAt.toISOString(),
      answeredAt: asInstant(run.command.answeredAt),
      detail: run.command.detail,
    },
    signatures: presentSignatures(run),
    recordHash: row.recordHash,
    stoppedReason: row.stoppedReason,
    amends: run.amends && { id: run.amends.id, number: run.amends.number },
    amendedBy: run.amendedBy,
    can: rightsOf(run, actor, progress.currentStep),
  };
}

function rightsOf(run: Run, actor: Actor, currentStep: Progress['currentStep']): Calibration['can'] {
  const { row } = run;
  const can = (action: keyof typeof calibrationPolicy) => may(calibrationPolicy, action, actor, row.siteId);
  const isRunning = row.status === 'running';
  const isPerformer = row.performerId === actor.userId;
  const isInCharge = isPerformer || can('review');
  const tookPart =
    isPerformer || [...run.steps, ...run.captures].some((part) => part.userId === actor.userId);
  const isReviewable = row.status === 'signed' && row.effectiveAt === null && !tookPart && can('review');
  return {
    continue: isRunning && isPerformer && can('perform'),
    stop: isRunning && isInCharge && can('stop'),
    handOver: isRunning && isInCharge && can('handOver'),
    sign: isPerformer && currentStep === 'sign' && can('perform'),
    approve: isReviewable,
    return: isReviewable,
    amend: row.signedAt !== null && row.status !== 'amended' && isInCharge && can('amend'),
    sendAgain: run.command?.state === 'failed' && can('command'),
  };
}

export const presentRecord = (run: Run): CalibrationRecord => ({
  number: run.row.number!,
  status: run.row.status,
  record: run.row.record!,
  canonicalForm: 'RFC 8785',
  hashAlgorithm: 'SHA-256',
  recordHash: run.row.recordHash!,
  signatures: presentSignatures(run),
  dueOn: run.row.dueOn,
  amends: run.amends?.number ?? null,
  amendedBy: run.amendedBy?.number ?? null,
});

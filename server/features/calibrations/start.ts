/** The start of a run: what it is for is fixed here, and everything that could spoil it later is refused here. */
import { Op, type Transaction } from 'sequelize';
import type { StartCalibration } from '../../../shared/contracts/calibrations.ts';
import { Area, Assignment, Calibration, Device, Point, Probe, Procedure } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { refusingByScience } from '../calculations/service.ts';
import { readSetting } from '../settings/service.ts';
import { nothingJudged } from './judge.ts';
import { gatherMeans, type Means } from './means.ts';
import { answerForUnusableLot } from './override.ts';
import { planRun, type Plan } from './plan.ts';
import { calibrationPolicy } from './policy.ts';
import { announce, momentOf, readRun, type Run } from './runs.ts';
import { solutionOf, thermometerOf } from './subject.ts';

const probeCodes = { notFound: 'probes.not-found', forbidden: 'calibrations.forbidden' } as const;
const violated = {
  calibrations_one_running_per_probe: 'calibrations.already-running',
  calibrations_key_key: 'calibrations.key-reused',
} as const;

/** A phone that was offline may bring its start along days later. */
const longestDelayMs = 7 * 86_400_000;

interface Place {
  probe: Probe;
  point: Point;
  siteId: number;
}

export async function startCalibration(parts: Parts, actor: Actor, input: StartCalibration): Promise<Run> {
  const known = await Calibration.findOne({ where: { key: input.key } });
  if (known) return repeatedStart(actor, known, input);
  await authoriseAt(actor, input.probeId);
  const now = parts.clock.now();
  const startedAt = momentOf(parts, input.capturedAt, new Date(now.getTime() - longestDelayMs));
  const means = await gatherMeans(actor, input, now.toISOString().slice(0, 10));
  const override = await answerForUnusableLot(parts, actor, means, input);
  const id = await refusingByConstraint(violated, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const place = await lockPlace(transaction, actor, input.probeId);
      const procedure = await chooseProcedure(transaction, place.probe, input.procedureId, now);
      refuseUnfitMeans(means, procedure, place.probe);
      const plan = await planOf(means, procedure, place, startedAt, now);
      const row = await createRun(transaction, actor, input, {
        ...place,
        procedure,
        means,
        plan,
        override,
        startedAt,
      });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'calibrations.started',
        objectKind: 'calibrations',
        objectId: row.id,
        objectVersion: row.version,
        siteId: place.siteId,
        newValue: {
          probeId: row.probeId,
          pointId: row.pointId,
          procedureId: row.procedureId,
          standardId: row.standardId,
          bottleId: row.bottleId,
          secondStandardId: row.secondStandardId,
          thermometerId: row.thermometerId,
          override,
          plan,
        },
        reason: override?.reason ?? null,
        capturedAt: startedAt,
      });
      announce(parts, transaction, row, 'created');
      return row.id;
    }),
  );
  return readRun(actor, id);
}

function repeatedStart(actor: Actor, known: Calibration, input: StartCalibration): Promise<Run> {
  const isSame =
    known.probeId === input.probeId &&
    known.standardId === input.standardId &&
    known.bottleId === input.bottleId &&
    known.secondStandardId === input.secondStandardId &&
    known.thermometerId === input.thermometerId;
  if (!isSame) throw new AppError('calibrations.key-reused');
  return readRun(actor, known.id);
}

async function authoriseAt(actor: Actor, probeId: number): Promise<void> {
  const probe = await Probe.findByPk(probeId);
  if (!probe) throw new AppError('probes.not-found');
  authorise(calibrationPolicy, 'perform', actor, probe.siteId, probeCodes);
}

/** The probe, locked, and the point it stands at. */
async function lockPlace(transaction: OpenTransaction, actor: Actor, probeId: number): Promise<Place> {
  const probe = (await Probe.findByPk(probeId, { transaction, lock: transaction.LOCK.UPDATE }))!;
  authorise(calibrationPolicy, 'perform', actor, probe.siteId, probeCodes);
  if (probe.status === 'retired') throw new AppError('probes.retired');
  const stand = await Assignment.findOne({ where: { probeId, toAt: null }, transaction });
  const point = stand && (await Point.findByPk(stand.pointId, { transaction }));
  const area = point && (await Area.findByPk(point.areaId, { transaction }));
  if (!point || !area) throw new AppError('calibrations.not-installed');
  const running = await Calibration.count({ where: { probeId, status: 'running' }, transaction });
  if (running > 0) throw new AppError('calibrations.already-running');
  return { probe, point, siteId: area.siteId };
}

/** The version in force that applies to this kind of probe. */
async function chooseProcedure(
  transaction: Transaction,
  probe: Probe,
  procedureId: number | undefined,
  now: Date,
): Promise<Procedure> {
  const procedure = await Procedure.findOne({
    where: {
      ...(procedureId === undefined ? {} : { id: procedureId }),
      probeKinds: { [Op.contains]: [probe.kind] },
      effectiveFrom: { [Op.lte]: now },
      replacedAt: null,
    },
    order: [
      ['effectiveFrom', 'DESC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  if (!procedure) throw new AppError('procedures.not-found');
  return procedure;
}

/** The procedure says what a run needs: nothing of it is skipped by hand. */
function refuseUnfitMeans(means: Means, procedure: Procedure, probe: Probe): void {
  const issues: { path: string; message: string }[] = [];
  if (procedure.steps.includes('second-point') && !means.second)
    issues.push({
      path: 'secondStandardId',
      message: 'The procedure verifies a second point: choose another lot for it.',
    });
  if (procedure.steps.includes('temperature-sensor') && !means.thermometer)
    issues.push({
      path: 'thermometerId',
      message: 'The procedure checks the temperature sensor: choose a reference thermometer.',
    });
  const { openBeakerLimitUsCm } = procedure.criteria;
  const solutions = [
    { path: 'standardId', value: means.referenceUsCm },
    { path: 'secondStandardId', value: means.secondReferenceUsCm },
  ];
  for (const { path, value } of solutions) {
    if (value === null) continue;
    if (value < openBeakerLimitUsCm) throw new AppError('calibrations.open-beaker');
    if (value > probe.rangeHighUsCm || value < probe.rangeLowUsCm)
      issues.push({ path, message: 'This solution lies outside the range of the probe.' });
  }
  if (issues.length > 0) throw new AppError('request.invalid', { issues });
}

async function planOf(
  means: Means,
  procedure: Procedure,
  { probe, point }: Place,
  startedAt: Date,
  now: Date,
): Promise<Plan> {
  const uncertainty = await readSetting('check-uncertainty');
  return planRun(
    {
      kind: probe.kind,
      resolutionUsCm: probe.resolutionUsCm,
      tolerancePercent: point.tolerancePercent,
      rule: point.decisionRule,
      criteria: procedure.criteria,
      thermometer: thermometerOf(means.thermometer),
      probeTemperatureStandardUncertaintyC: uncertainty.temperatureStandardUncertaintyC,
      solution: refusingByScience(() => solutionOf(means.standard, means.bottle, startedAt)),
      repeatabilityPercent: uncertainty.repeatabilityPercent,
    },
    now.toISOString().slice(0, 10),
  );
}

async function createRun(
  transaction: OpenTransaction,
  actor: Actor,
  input: StartCalibration,
  fixed: Place & {
    procedure: Procedure;
    means: Means;
    plan: Plan;
    override: Calibration['override'];
    startedAt: Date;
  },
): Promise<Calibration> {
  const { probe, point } = fixed;
  const device = await Device.findOne({ where: { probeId: probe.id, revokedAt: null }, transaction });
  return Calibration.create(
    {
      key: input.key,
      status: 'running',
      tolerancePercent: point.tolerancePercent,
      decisionRule: point.decisionRule,
      // What the transmitter says it works with; a run that finds another value than the record settles it.
      cellConstantBeforePerCm: device?.reportedCellConstantPerCm ?? probe.cellConstantPerCm,
      override: fixed.override,
      plan: fixed.plan,
      judgement: nothingJudged,
      startedAt: fixed.startedAt,
      probeId: probe.id,
      pointId: point.id,
      siteId: fixed.siteId,
      procedureId: fixed.procedure.id,
      standardId: fixed.means.standard.id,
      bottleId: fixed.means.bottle?.id ?? null,
      secondStandardId: fixed.means.second?.id ?? null,
      thermometerId: fixed.means.thermometer?.id ?? null,
      performerId: actor.userId,
    },
    { transaction },
  );
}

/** What a run does once it counts: comparisons, the cell constant on record, the next due date, the order to the device. */
import type { Verdict } from '../../../shared/contracts/calibrations.ts';
import type { CheckStage, RunStep } from '../../../shared/contracts/vocabulary.ts';
import { toDateInput } from '../../../shared/format/dates.ts';
import { CellConstant, Check, Point, Probe, ProbeEvent } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';
import type { Actor } from '../../http/actor.ts';
import type { Parts } from '../../parts.ts';
import { refreshPrompts } from '../prompts/service.ts';
import { orderCellConstant } from './commands.ts';
import { endHoldOfRun } from './holds.ts';
import { stepDone, type Run, type Told } from './runs.ts';

const dayMs = 86_400_000;

/** Sets what it changes on the run's row and saves it. Answers what else has changed for others. */
export async function bringIntoEffect(
  parts: Parts,
  transaction: OpenTransaction,
  actor: Actor,
  run: Run,
): Promise<Told[]> {
  const now = parts.clock.now();
  const told = new Set<Told>(['checks', 'probes', 'readings']);
  await writeChecks(transaction, run, now);
  await recordCellConstant(transaction, actor, run, now);
  await orderCellConstant(parts, transaction, actor, run);
  if (await endHoldOfRun(transaction, run, now)) told.add('points');
  await run.row.update({ effectiveAt: now, dueOn: await dueOnOf(transaction, run) }, { transaction });
  await refreshPrompts(parts, transaction, run.row.probeId);
  return [...told];
}

const asLeftAt = (run: Run): Date =>
  (stepDone(run, 'as-left') ?? stepDone(run, 'decide') ?? run.steps.at(-1))!.capturedAt;

/** From the day the probe was left, in the site's own calendar; a later approval does not stretch it. */
async function dueOnOf(transaction: OpenTransaction, run: Run): Promise<string> {
  const point = await Point.findByPk(run.row.pointId, { transaction });
  const left = toDateInput(asLeftAt(run), { timeZone: run.row.site.timeZone });
  const due = new Date(`${left}T00:00:00Z`).getTime() + (point?.intervalDays ?? 0) * dayMs;
  return new Date(due).toISOString().slice(0, 10);
}

async function writeChecks(transaction: OpenTransaction, run: Run, receivedAt: Date): Promise<void> {
  const { asFound, cleaned, asLeft } = run.row.judgement;
  const at = (step: RunStep): Date => stepDone(run, step)?.capturedAt ?? asLeftAt(run);
  const stages: [CheckStage, Verdict | null, Date][] = [
    ['as-found', asFound, at('as-found')],
    ['as-found-cleaned', cleaned, at('as-found-cleaned')],
    ['as-left', asLeft, asLeftAt(run)],
  ];
  for (const [stage, verdict, stageAt] of stages) {
    // A probe that shows nothing implies no cell constant: the record says so, a comparison could not.
    if (!verdict || verdict.impliedCellConstantPerCm === null) continue;
    await Check.create(checkOf(run, stage, verdict, stageAt, receivedAt), { transaction });
  }
}

const checkOf = ({ row }: Run, stage: CheckStage, verdict: Verdict, at: Date, receivedAt: Date) => ({
  stage,
  n: null,
  deviceId: null,
  bootId: null,
  solution: verdict.lotCode,
  isValid: true,
  invalidReason: null,
  conductivityUsCm: verdict.meanUsCm,
  temperatureC: verdict.meanTemperatureC,
  cellConstantPerCm: verdict.cellConstantPerCm,
  referenceUsCm: verdict.referenceUsCm,
  errorPercent: verdict.errorPercent,
  impliedCellConstantPerCm: verdict.impliedCellConstantPerCm,
  expandedUncertaintyPercent: verdict.expandedUncertaintyPercent,
  coverageFactor: verdict.coverageFactor,
  tolerancePercent: row.tolerancePercent,
  decisionRule: row.decisionRule,
  outcome: verdict.outcome,
  probabilityOutside: verdict.probabilityOutside,
  acceptanceLimitPercent: verdict.acceptanceLimitPercent,
  budget: verdict.budget,
  referenceSource: verdict.referenceSource,
  at,
  receivedAt,
  probeId: row.probeId,
  pointId: row.pointId,
  standardId: row.standardId,
  performedByUserId: row.performerId,
});

/** Also when nothing was adjusted but the transmitter worked with another constant than the record said. */
async function recordCellConstant(
  transaction: OpenTransaction,
  actor: Actor,
  { row, steps }: Run,
  now: Date,
): Promise<void> {
  const probe = (await Probe.findByPk(row.probeId, { transaction, lock: transaction.LOCK.UPDATE }))!;
  const after = row.cellConstantAfterPerCm;
  if (after === null || after === probe.cellConstantPerCm) return;
  const before = probe.cellConstantPerCm;
  const said = steps.find(({ step }) => step === 'decide')?.data['reason'];
  const reason = typeof said === 'string' ? said : null;
  await probe.update({ cellConstantPerCm: after }, { transaction });
  await CellConstant.create(
    {
      cellConstantPerCm: after,
      fromAt: now,
      origin: 'calibration',
      reason: [row.number, reason].filter(Boolean).join(': '),
      probeId: row.probeId,
      userId: actor.userId,
    },
    { transaction },
  );
  await ProbeEvent.create(
    {
      kind: 'adjusted',
      detail: { name: row.number, beforePerCm: before, afterPerCm: after, reason, calibrationId: row.id },
      at: now,
      probeId: row.probeId,
      pointId: row.pointId,
      userId: actor.userId,
    },
    { transaction },
  );
}

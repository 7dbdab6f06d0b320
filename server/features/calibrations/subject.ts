/** Rows of a run as the judgement takes them: lots, thermometer, readings that count, and the visit before. */
import { Op, type Transaction } from 'sequelize';
import type { Judgement } from '../../../shared/contracts/calibrations.ts';
import type { BudgetRow } from '../../../shared/contracts/checks.ts';
import { Check, type Bottle, type Instrument, type Standard } from '../../db/models/index.ts';
import { refusingByScience } from '../calculations/service.ts';
import { readSetting } from '../settings/service.ts';
import type { Circumstances, Solution } from './budget.ts';
import { lotOf } from './lot.ts';
import { judgeRun, type JudgeInput, type LastVisit } from './judge.ts';
import { decisionOf, finishedOf, type Run } from './runs.ts';
import { isSameConstant } from './same-constant.ts';

const dayMs = 86_400_000;

export const solutionOf = (row: Standard, bottle: Bottle | null, startedAt: Date): Solution => ({
  code: row.code,
  lot: lotOf(row),
  isOpened: bottle === null || (bottle.openedAt !== null && bottle.openedAt < startedAt),
});

export const thermometerOf = (row: Instrument | null): Circumstances['thermometer'] =>
  row && {
    standardUncertaintyC: row.expandedUncertainty / row.coverageFactor,
    correctionC: row.correction,
  };

/** What was left at the visit before, if the probe still works with the constant it was left with. */
async function lastVisitOf(run: Run, transaction: Transaction | null): Promise<LastVisit | null> {
  const { row } = run;
  const left = await Check.findOne({
    where: { probeId: row.probeId, stage: 'as-left', isValid: true, at: { [Op.lt]: row.startedAt } },
    order: [['at', 'DESC']],
    transaction,
  });
  if (!left) return null;
  const isSame = isSameConstant(left.cellConstantPerCm!, row.cellConstantBeforePerCm);
  return isSame
    ? {
        errorPercent: left.errorPercent!,
        expandedUncertaintyPercent: left.expandedUncertaintyPercent!,
        coverageFactor: left.coverageFactor!,
        daysBefore: (row.startedAt.getTime() - left.at.getTime()) / dayMs,
        isSameLot: left.standardId === row.standardId,
        budget: (left.budget as BudgetRow[] | null) ?? [],
      }
    : null;
}

export async function judgeInputOf(run: Run, transaction: Transaction | null = null): Promise<JudgeInput> {
  const { row } = run;
  const uncertainty = await readSetting('check-uncertainty');
  return {
    kind: row.probe.kind,
    resolutionUsCm: row.probe.resolutionUsCm,
    nominalCellConstantPerCm: row.probe.nominalCellConstantPerCm,
    tolerancePercent: row.tolerancePercent,
    rule: row.decisionRule,
    criteria: row.procedure.criteria,
    thermometer: thermometerOf(row.thermometer ?? null),
    probeTemperatureStandardUncertaintyC: uncertainty.temperatureStandardUncertaintyC,
    solution: solutionOf(row.standard, row.bottle ?? null, row.startedAt),
    secondSolution: row.secondStandard ? solutionOf(row.secondStandard, null, row.startedAt) : null,
    readings: run.captures.filter(({ exclusion }) => !exclusion),
    finished: finishedOf(run),
    decision: decisionOf(run),
    cellConstantAfterPerCm: row.cellConstantAfterPerCm,
    lastVisit: await lastVisitOf(run, transaction),
  };
}

/** The judgement of what is finished; a temperature the lot says nothing about is refused in words. */
export async function judge(run: Run, transaction: Transaction | null): Promise<Judgement> {
  const input = await judgeInputOf(run, transaction);
  return refusingByScience(() => judgeRun(input));
}

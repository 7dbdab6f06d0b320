/**
 * A check reading becomes a comparison: what the lot in the cell really conducts at that temperature against what
 * the probe indicated. What cannot count is kept with its reason and never used.
 */
import type { BudgetRow } from '../../shared/contracts/checks.ts';
import type { SettingValue } from '../../shared/contracts/settings.ts';
import type { CheckInvalidReason } from '../../shared/contracts/vocabulary.ts';
import type { CertifiedLot } from '../../shared/science/certified-lots.ts';
import { evaluateCheck, type CheckEvaluation } from '../../shared/science/check-evaluation.ts';
import { ScienceError } from '../../shared/science/errors.ts';
import type { IncomingReading } from './message.ts';
import type { LotRow, PointRow, ProbeRow } from './queries.ts';

export interface CheckCircumstances {
  reading: IncomingReading;
  /** Undefined: no lot has that code. */
  lot: LotRow | undefined;
  /** Where the probe stood; its requirements decide. */
  point: PointRow | null;
  probe: Pick<ProbeRow, 'resolutionUsCm'>;
  /** In use in the device when it took the reading. */
  cellConstantPerCm: number | null;
  uncertainty: SettingValue<'check-uncertainty'>;
}

export type CheckResult =
  | { isValid: false; reason: CheckInvalidReason }
  | { isValid: true; evaluation: CheckEvaluation; impliedCellConstantPerCm: number; budget: BudgetRow[] };

const invalid = (reason: CheckInvalidReason): CheckResult => ({ isValid: false, reason });

/** The lot may be used up to and including its last day, in UTC. */
const isExpired = (lot: LotRow, atMs: number): boolean =>
  new Date(atMs).toISOString().slice(0, 10) > lot.expiresOn;

/** Why the solution cannot count; null when it can. */
function judgeSolution({ reading, lot }: CheckCircumstances): CheckInvalidReason | null {
  if (reading.solution === null || reading.solution.trim() === '') return 'solution-missing';
  if (!lot) return 'solution-unknown';
  if (lot.state === 'recalled') return 'solution-recalled';
  if (lot.state === 'quarantined') return 'solution-quarantined';
  return isExpired(lot, reading.atMs) ? 'solution-expired' : null;
}

export function evaluate(circumstances: CheckCircumstances): CheckResult {
  const { reading, lot, point, cellConstantPerCm } = circumstances;
  const { conductivityUsCm, temperatureC, flags } = reading;
  const ofSolution = judgeSolution(circumstances);
  if (ofSolution !== null || !lot) return invalid(ofSolution ?? 'solution-unknown');
  // An indication of nothing implies no cell constant: the cell was empty or the wire broken.
  if (conductivityUsCm === null || conductivityUsCm === 0) return invalid('no-conductivity');
  if (temperatureC === null || flags.includes('t_open') || flags.includes('t_short'))
    return invalid('no-temperature');
  if (reading.quality !== 'good' || flags.length > 0) return invalid('quality-not-good');
  if (!point) return invalid('not-installed');
  if (cellConstantPerCm === null) return invalid('no-cell-constant');
  return compare({ ...circumstances, lot, point, cellConstantPerCm, conductivityUsCm, temperatureC });
}

function compare(
  options: CheckCircumstances & {
    lot: LotRow;
    point: PointRow;
    cellConstantPerCm: number;
    conductivityUsCm: number;
    temperatureC: number;
  },
): CheckResult {
  const { lot, point, probe, uncertainty, cellConstantPerCm, conductivityUsCm, temperatureC } = options;
  try {
    const evaluation = evaluateCheck({
      // The columns' constraints hold exactly what the science's types name.
      lot: lot as CertifiedLot,
      temperatureC,
      temperatureStandardUncertaintyC: uncertainty.temperatureStandardUncertaintyC,
      conductivityUsCm,
      cellConstantPerCm,
      tolerancePercent: point.tolerancePercent,
      rule: point.decisionRule,
      repeatabilityPercent: uncertainty.repeatabilityPercent,
      ...(probe.resolutionUsCm === null ? {} : { resolutionUsCm: probe.resolutionUsCm }),
    });
    if (evaluation.impliedCellConstantPerCm === null) return invalid('no-conductivity');
    return {
      isValid: true,
      evaluation,
      impliedCellConstantPerCm: evaluation.impliedCellConstantPerCm,
      budget: evaluation.budget.map(toContract),
    };
  } catch (error) {
    // The lot says nothing about this temperature, or contradicts itself: either way it gives no reference here.
    if (error instanceof ScienceError) return invalid('outside-solution-range');
    throw error;
  }
}

function toContract(row: CheckEvaluation['budget'][number]): BudgetRow {
  return {
    name: row.name,
    standardUncertaintyPercent: row.contribution,
    sharePercent: 100 * row.share,
    distribution: row.distribution,
    degreesOfFreedom: Number.isFinite(row.degreesOfFreedom) ? row.degreesOfFreedom : null,
  };
}

import { Check } from '../../server/db/models/index.ts';
import { asContract } from '../../server/features/calibrations/budget.ts';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import { evaluateCheck } from '../../shared/science/check-evaluation.ts';
import type { CertifiedLot } from '../../shared/science/certified-lots.ts';
import { settingDefaults } from '../../shared/contracts/settings.ts';
import type { CheckStage } from '../../shared/contracts/vocabulary.ts';
import type { CalibrationSeed, StageSeed } from '../../simulator/scenario/calibration-visit.ts';
import type { ProbeTimeline } from '../../simulator/scenario/timeline.ts';
import type { LotSeed, PointSeed } from '../../simulator/scenario/types.ts';
import { need, type Loading } from './loading.ts';

type NewCheck = Parameters<typeof Check.create>[0];
const rowsPerInsert = 1000;

export const certifiedLotOf = (lot: LotSeed): CertifiedLot => ({
  medium: lot.medium,
  basis: lot.basis,
  nominal: lot.nominal,
  certifiedConductivityUsCm: lot.certifiedUsCm,
  referenceTemperatureC: lot.referenceTemperatureC,
  expandedUncertaintyUsCm: Number(
    ((lot.certifiedUsCm * lot.expandedUncertaintyPercent) / 100).toPrecision(3),
  ),
  coverageFactor: lot.coverageFactor,
  temperatureTable: lot.temperatureTable,
});

interface Comparison {
  stage: CheckStage;
  lot: LotSeed;
  point: PointSeed;
  at: number;
  n: number | null;
  conductivityUsCm: number;
  temperatureC: number;
  cellConstantPerCm: number;
  performedBy: string | null;
  /** Standard deviation of the mean, %. */
  repeatabilityPercent: number;
  temperatureStandardUncertaintyC: number;
}

function rowOf(loading: Loading, timeline: ProbeTimeline, comparison: Comparison): NewCheck {
  const { lot, point } = comparison;
  const device = loading.devices.get(timeline.probe.key);
  const fact = {
    stage: comparison.stage,
    n: comparison.n,
    deviceId: comparison.n === null ? null : (device?.id ?? null),
    bootId: comparison.n === null ? null : (device?.bootId ?? null),
    solution: lot.code,
    conductivityUsCm: comparison.conductivityUsCm,
    temperatureC: comparison.temperatureC,
    cellConstantPerCm: comparison.cellConstantPerCm,
    at: new Date(comparison.at),
    receivedAt: new Date(comparison.at + 2000),
    probeId: need(loading.probes, timeline.probe.key),
    pointId: need(loading.points, point.code).id,
    standardId: need(loading.standards, lot.code),
    performedByUserId: comparison.performedBy === null ? null : need(loading.users, comparison.performedBy),
  };
  try {
    const result = evaluateCheck({
      lot: certifiedLotOf(lot),
      temperatureC: comparison.temperatureC,
      temperatureStandardUncertaintyC: comparison.temperatureStandardUncertaintyC,
      conductivityUsCm: comparison.conductivityUsCm,
      cellConstantPerCm: comparison.cellConstantPerCm,
      tolerancePercent: point.tolerancePercent,
      rule: point.decisionRule,
      resolutionUsCm: timeline.probe.resolutionUsCm,
      repeatabilityPercent: comparison.repeatabilityPercent,
    });
    const {
      referenceSource,
      referenceUsCm,
      errorPercent,
      impliedCellConstantPerCm,
      expandedUncertaintyPercent,
    } = result;
    const { coverageFactor, outcome, probabilityOutside, acceptanceLimitPercent, budget } = result;
    return {
      ...fact,
      isValid: true,
      invalidReason: null,
      referenceSource,
      referenceUsCm,
      errorPercent,
      impliedCellConstantPerCm,
      expandedUncertaintyPercent,
      coverageFactor,
      outcome,
      probabilityOutside,
      acceptanceLimitPercent,
      budget: budget.map(asContract),
      tolerancePercent: point.tolerancePercent,
      decisionRule: point.decisionRule,
    };
  } catch (error) {
    if (!(error instanceof OutOfDomainError)) throw error;
    return { ...fact, ...noResult, isValid: false, invalidReason: 'outside-solution-range' };
  }
}

const noResult = {
  referenceSource: null,
  referenceUsCm: null,
  errorPercent: null,
  impliedCellConstantPerCm: null,
  expandedUncertaintyPercent: null,
  coverageFactor: null,
  outcome: null,
  probabilityOutside: null,
  acceptanceLimitPercent: null,
  budget: null,
  tolerancePercent: null,
  decisionRule: null,
};

const mean = (values: number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length;

/** Bench practice with a reference thermometer in the same portion: 0.03 K, standard. */
const benchThermometerC = 0.03;

function stageComparison(
  stage: StageSeed,
  visit: CalibrationSeed,
  lot: LotSeed,
  point: PointSeed,
): Comparison {
  const { repeatabilityPercent } = settingDefaults['check-uncertainty'];
  return {
    stage: stage.stage,
    lot,
    point,
    at: stage.replicates.at(-1)!.at,
    n: null,
    conductivityUsCm: mean(stage.replicates.map((one) => one.conductivityUsCm)),
    temperatureC: mean(stage.replicates.map((one) => one.referenceTemperatureC)),
    cellConstantPerCm: stage.cellConstantPerCm,
    performedBy: visit.performedBy,
    repeatabilityPercent: repeatabilityPercent / Math.sqrt(stage.replicates.length),
    temperatureStandardUncertaintyC: benchThermometerC,
  };
}

export async function loadChecks(loading: Loading): Promise<number> {
  const lots = new Map(loading.history.lots.map((lot) => [lot.code, lot]));
  const defaults = settingDefaults['check-uncertainty'];
  const rows: NewCheck[] = [];
  for (const timeline of loading.history.timelines) {
    const points = new Map(timeline.stays.map((stay) => [stay.point.code, stay.point]));
    for (const visit of timeline.calibrations) {
      const point = need(points, visit.point);
      for (const stage of visit.stages)
        rows.push(rowOf(loading, timeline, stageComparison(stage, visit, need(lots, stage.lotCode), point)));
    }
    for (const check of timeline.checks) {
      const comparison = {
        ...check,
        ...defaults,
        stage: 'automatic' as const,
        lot: need(lots, check.lotCode),
        point: need(points, check.point),
        performedBy: null,
      };
      rows.push(rowOf(loading, timeline, comparison));
    }
  }
  rows.sort((one, other) => Number(one!.at) - Number(other!.at));
  for (let from = 0; from < rows.length; from += rowsPerInsert) {
    await Check.bulkCreate(rows.slice(from, from + rowsPerInsert) as never, { returning: false });
  }
  return rows.length;
}

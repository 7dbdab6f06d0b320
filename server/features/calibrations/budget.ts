/**
 * Pure: one state of the probe against its solution, with everything that a beaker beside the probe adds to U.
 * Half-widths below are common practice where no paper is named; each is a rectangular distribution [GUM 4.3.7].
 */
import type { BudgetRow } from '../../../shared/contracts/checks.ts';
import type { Verdict } from '../../../shared/contracts/calibrations.ts';
import type { Criteria } from '../../../shared/contracts/procedures.ts';
import type { DecisionRule, ProbeKind } from '../../../shared/contracts/vocabulary.ts';
import { lotReferenceConductivity, type CertifiedLot } from '../../../shared/science/certified-lots.ts';
import { evaluateCheck, type CheckEvaluation } from '../../../shared/science/check-evaluation.ts';
import type { UncertaintyComponent } from '../../../shared/science/uncertainty.ts';

/** Rinse water left on the cell after two or three rinses with the solution itself. */
const rinseDilutionPercent = 0.15;
/** Evaporation and what the glass gives off, from opening to the end of its time. */
const openedBottlePercent = 0.2;
/** Half of the 1.1 µS/cm that water in balance with air owes to carbon dioxide [Pratt et al. 2001]. */
const carbonDioxideUsCm = 0.55;
/** An inductive cell feels the wall of its vessel even at the clearance asked for. */
const wallDistancePercent = 0.5;

export interface Solution {
  code: string;
  lot: CertifiedLot;
  /** False only for a bottle that is known to be fresh. */
  isOpened: boolean;
}

export interface Circumstances {
  kind: ProbeKind;
  resolutionUsCm: number | null;
  tolerancePercent: number;
  rule: DecisionRule;
  criteria: Pick<Criteria, 'temperatureRangeC'>;
  thermometer: { standardUncertaintyC: number; correctionC: number } | null;
  /** Of the probe's own sensor, when no thermometer stood in the solution. */
  probeTemperatureStandardUncertaintyC: number;
}

/** A captured reading that counts. */
export interface CountingReading {
  conductivityUsCm: number;
  temperatureC: number;
  referenceTemperatureC: number | null;
  /** What the device multiplied with. */
  cellConstantPerCm: number;
}

export function otherComponents(
  given: Circumstances,
  solution: Solution,
  temperatureC: number,
): UncertaintyComponent[] {
  const reference = lotReferenceConductivity({ lot: solution.lot, temperatureC });
  const rectangular = (name: string, value: number, sensitivity = 1): UncertaintyComponent => ({
    name,
    value,
    distribution: 'rectangular',
    sensitivity,
  });
  const perUsCm = 100 / reference.conductivityUsCm;
  const components = [
    // Thermometer and cell are not at the same place; while stable they differ by no more than the criterion.
    rectangular('temperature gradient', given.criteria.temperatureRangeC, reference.slopeUsCmPerK * perUsCm),
    rectangular('rinse dilution', rinseDilutionPercent),
    rectangular('carbon dioxide', carbonDioxideUsCm, perUsCm),
  ];
  if (solution.isOpened) components.push(rectangular('opened bottle', openedBottlePercent));
  if (given.kind === 'inductive') components.push(rectangular('wall distance', wallDistancePercent));
  return components;
}

export const temperatureUncertainty = (given: Circumstances, isByThermometer: boolean): number =>
  given.thermometer && isByThermometer
    ? given.thermometer.standardUncertaintyC
    : given.probeTemperatureStandardUncertaintyC;

export const meanOf = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;

const standardDeviation = (values: readonly number[]): number => {
  const mean = meanOf(values);
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return Math.sqrt(squares / (values.length - 1));
};

/** Temperatures of the solution; the thermometer's only when it was read beside every replicate. */
function temperaturesOf(readings: readonly CountingReading[], given: Circumstances) {
  const { thermometer } = given;
  const isByThermometer =
    thermometer !== null && readings.every(({ referenceTemperatureC }) => referenceTemperatureC !== null);
  const temperatures = readings.map((reading) =>
    isByThermometer ? (reading.referenceTemperatureC ?? 0) + thermometer.correctionC : reading.temperatureC,
  );
  return { isByThermometer, temperatures };
}

/**
 * Mean of the replicates against what this lot conducts at their temperature. With `cellConstantPerCm` the readings
 * are taken as the device would have shown them with that constant: the raw conductance is the same.
 */
export function compareState(
  readings: readonly CountingReading[],
  solution: Solution,
  given: Circumstances,
  cellConstantPerCm: number | null = null,
): Verdict {
  const { isByThermometer, temperatures } = temperaturesOf(readings, given);
  const shown = readings.map(({ conductivityUsCm, cellConstantPerCm: inUse }) =>
    cellConstantPerCm === null ? conductivityUsCm : (conductivityUsCm * cellConstantPerCm) / inUse,
  );
  // Each replicate against the reference at its own temperature, so that a warming beaker is not taken for scatter.
  const ratios = shown.map(
    (value, index) =>
      value /
      lotReferenceConductivity({ lot: solution.lot, temperatureC: temperatures[index] ?? 0 })
        .conductivityUsCm,
  );
  const repeatabilityPercent = 100 * standardDeviation(ratios);
  const meanTemperatureC = meanOf(temperatures);
  const inUse = cellConstantPerCm ?? meanOf(readings.map((reading) => reading.cellConstantPerCm));
  const meanUsCm = meanOf(shown);
  const evaluation = evaluateCheck({
    lot: solution.lot,
    temperatureC: meanTemperatureC,
    temperatureStandardUncertaintyC: temperatureUncertainty(given, isByThermometer),
    conductivityUsCm: meanUsCm,
    cellConstantPerCm: inUse,
    tolerancePercent: given.tolerancePercent,
    rule: given.rule,
    ...(given.resolutionUsCm === null ? {} : { resolutionUsCm: given.resolutionUsCm }),
    repeatabilityPercent: repeatabilityPercent / Math.sqrt(readings.length),
    repeatabilityDegreesOfFreedom: readings.length - 1,
    otherComponents: otherComponents(given, solution, meanTemperatureC),
  });
  return {
    lotCode: solution.code,
    replicateCount: readings.length,
    meanUsCm,
    meanTemperatureC,
    repeatabilityPercent,
    cellConstantPerCm: inUse,
    ...resultOf(evaluation),
  };
}

const resultOf = (evaluation: CheckEvaluation) => ({
  referenceUsCm: evaluation.referenceUsCm,
  referenceSource: evaluation.referenceSource,
  errorPercent: evaluation.errorPercent,
  expandedUncertaintyPercent: evaluation.expandedUncertaintyPercent,
  coverageFactor: evaluation.coverageFactor,
  impliedCellConstantPerCm: evaluation.impliedCellConstantPerCm,
  outcome: evaluation.outcome,
  probabilityOutside: evaluation.probabilityOutside,
  acceptanceLimitPercent: evaluation.acceptanceLimitPercent,
  budget: evaluation.budget.map(asContract),
});

export const asContract = (row: CheckEvaluation['budget'][number]): BudgetRow => ({
  name: row.name,
  standardUncertaintyPercent: row.contribution,
  sharePercent: 100 * row.share,
  distribution: row.distribution,
  degreesOfFreedom: Number.isFinite(row.degreesOfFreedom) ? row.degreesOfFreedom : null,
});

/** What two comparisons with the same bottle, thermometer and hour have in common, by name of the budget row. */
const sharedWithinVisit = ['lot value', 'interpolation', 'temperature', 'opened bottle', 'carbon dioxide'];
/** Another visit with the same lot shares its certificate only. */
const sharedBetweenVisits = ['lot value'];

/** Correlation of two errors from the parts of their budgets that are one and the same quantity [GUM 5.2.2]. */
export function correlationOf(
  one: { budget: readonly BudgetRow[] },
  other: { budget: readonly BudgetRow[] },
  isSameVisit: boolean,
): number {
  const names = isSameVisit ? sharedWithinVisit : sharedBetweenVisits;
  const part = (rows: readonly BudgetRow[], name: string): number =>
    rows.find((row) => row.name === name)?.standardUncertaintyPercent ?? 0;
  const total = (rows: readonly BudgetRow[]): number =>
    Math.hypot(...rows.map((row) => row.standardUncertaintyPercent));
  const common = names.reduce((sum, name) => sum + part(one.budget, name) * part(other.budget, name), 0);
  const product = total(one.budget) * total(other.budget);
  return product > 0 ? Math.min(1, common / product) : 0;
}

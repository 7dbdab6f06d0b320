/** Before anybody walks to the probe: can this lot and thermometer decide this tolerance, and what would? */
import { Op } from 'sequelize';
import type { Calibration as OnWire } from '../../../shared/contracts/calibrations.ts';
import { formatNumber } from '../../../shared/format/numbers.ts';
import { lotReferenceConductivity } from '../../../shared/science/certified-lots.ts';
import { evaluateCheck } from '../../../shared/science/check-evaluation.ts';
import { assessMethod } from '../../../shared/science/decision.ts';
import { ScienceError } from '../../../shared/science/errors.ts';
import { Instrument, Standard } from '../../db/models/index.ts';
import { otherComponents, temperatureUncertainty, type Circumstances, type Solution } from './budget.ts';
import { solutionOf, thermometerOf } from './subject.ts';

export type Plan = OnWire['plan'];

export interface PlanInput extends Circumstances {
  solution: Solution;
  /** Expected of the mean of the replicates. */
  repeatabilityPercent: number;
}

interface Planned {
  expandedUncertaintyPercent: number;
  canDecide: boolean;
  largest: string;
}

/** A probe that is exactly right shows what the method can do. */
export function assessPlan(input: PlanInput): Planned {
  const { lot } = input.solution;
  const temperatureC = lot.referenceTemperatureC;
  const result = evaluateCheck({
    lot,
    temperatureC,
    temperatureStandardUncertaintyC: temperatureUncertainty(input, true),
    conductivityUsCm: lotReferenceConductivity({ lot, temperatureC }).conductivityUsCm,
    cellConstantPerCm: 1,
    tolerancePercent: input.tolerancePercent,
    rule: input.rule,
    ...(input.resolutionUsCm === null ? {} : { resolutionUsCm: input.resolutionUsCm }),
    repeatabilityPercent: input.repeatabilityPercent,
    otherComponents: otherComponents(input, input.solution, temperatureC),
  });
  const method = assessMethod({
    expandedUncertainty: result.expandedUncertaintyPercent,
    tolerance: input.tolerancePercent,
    rule: input.rule,
    coverageFactor: result.coverageFactor,
  });
  const [largest] = result.budget.toSorted((one, other) => other.share - one.share);
  return {
    expandedUncertaintyPercent: result.expandedUncertaintyPercent,
    canDecide: method.canDecideWithin,
    largest: largest?.name ?? 'method',
  };
}

const percent = (value: number): string => formatNumber(value, { decimals: 2, unit: '%' });

export async function planRun(input: PlanInput, today: string): Promise<Plan> {
  const planned = assessPlan(input);
  const { expandedUncertaintyPercent, canDecide } = planned;
  const against = `U ${percent(expandedUncertaintyPercent)} against ${percent(input.tolerancePercent)}`;
  if (canDecide)
    return {
      canDecide,
      expandedUncertaintyPercent,
      sentence: `This lot and thermometer can decide this tolerance: ${against}.`,
    };
  const better = await findBetter(input, today);
  return {
    canDecide,
    expandedUncertaintyPercent,
    sentence: `This lot and thermometer cannot decide this tolerance: ${against}, most of it from the ${planned.largest}. ${better}`,
  };
}

/** A working value may lie within half a decade of the solution's. */
const nearbyFactor = Math.sqrt(10);

/** The usable lot and thermometer with the smallest U near the same value. */
async function findBetter(input: PlanInput, today: string): Promise<string> {
  const lots = await Standard.findAll({ where: { state: 'released', expiresOn: { [Op.gte]: today } } });
  const thermometers = await Instrument.findAll({
    where: { kind: 'thermometer', state: 'in-use', dueOn: { [Op.gte]: today } },
  });
  const finest = thermometers.toSorted(
    (one, other) =>
      one.expandedUncertainty / one.coverageFactor - other.expandedUncertainty / other.coverageFactor,
  )[0];
  const own = referenceOf(input.solution);
  let best: { text: string; planned: Planned } | null = null;
  for (const row of lots) {
    const solution = { ...solutionOf(row, null, row.createdAt), isOpened: input.solution.isOpened };
    const value = referenceOf(solution);
    if (own === null || value === null || value > own * nearbyFactor || value < own / nearbyFactor) continue;
    const thermometer = finest ? thermometerOf(finest) : input.thermometer;
    const planned = assessPlan({ ...input, solution, thermometer });
    if (!planned.canDecide) continue;
    if (best && best.planned.expandedUncertaintyPercent <= planned.expandedUncertaintyPercent) continue;
    best = { text: finest ? `${row.code} with thermometer ${finest.code}` : row.code, planned };
  }
  return best
    ? `${best.text} would: U ${percent(best.planned.expandedUncertaintyPercent)}.`
    : 'No lot and thermometer on record would: widen the tolerance if the process allows, or ask for an accredited calibration.';
}

export function referenceOf({ lot }: Solution): number | null {
  try {
    return lotReferenceConductivity({ lot, temperatureC: lot.referenceTemperatureC }).conductivityUsCm;
  } catch (error) {
    if (error instanceof ScienceError) return null;
    throw error;
  }
}

/** Bench calculations over the API: a lot is looked up, the rest is the science's own arithmetic. */
import type {
  Calculation,
  PlannedAnswer,
  PlannedComparison,
  StandardConductivity,
} from '../../../shared/contracts/calculations.ts';
import type { CertifiedLot } from '../../../shared/science/certified-lots.ts';
import { evaluateCheck } from '../../../shared/science/check-evaluation.ts';
import { assessMethod } from '../../../shared/science/decision.ts';
import { ScienceError } from '../../../shared/science/errors.ts';
import { kclStandardConductivity } from '../../../shared/science/kcl-standards.ts';
import { AppError } from '../../errors.ts';
import { Standard } from '../../db/models/index.ts';
import { figureOfBasis, figureOfLot } from './figures.ts';

type Solution = StandardConductivity['solution'];

/** A refusal of the science is an answer about the input: which quantity, which limits. */
export function refusingByScience<T>(compute: () => T): T {
  try {
    return compute();
  } catch (error) {
    if (error instanceof ScienceError)
      throw new AppError('reference.outside-domain', { detail: error.message });
    throw error;
  }
}

async function readLot(standardId: number): Promise<CertifiedLot> {
  const row = await Standard.findByPk(standardId);
  if (!row) throw new AppError('standards.not-found');
  return {
    medium: row.medium,
    basis: row.basis,
    nominal: row.nominal as CertifiedLot['nominal'],
    certifiedConductivityUsCm: row.certifiedConductivityUsCm,
    referenceTemperatureC: row.referenceTemperatureC,
    expandedUncertaintyUsCm: row.expandedUncertaintyUsCm,
    coverageFactor: row.coverageFactor,
    temperatureTable: row.temperatureTable as CertifiedLot['temperatureTable'],
  };
}

export async function standardFigures({
  solution,
  temperatureC,
}: StandardConductivity): Promise<Calculation> {
  if (solution.by === 'basis') {
    return { figures: [refusingByScience(() => figureOfBasis({ ...solution, temperatureC }))], refusals: [] };
  }
  const lot = await readLot(solution.standardId);
  return { figures: [refusingByScience(() => figureOfLot(lot, temperatureC))], refusals: [] };
}

/** A basis as a lot that states nothing but it: its uncertainty is the table's. */
function lotOfBasis(solution: Extract<Solution, { by: 'basis' }>): CertifiedLot {
  const at25 = kclStandardConductivity({ ...solution, temperatureC: 25 });
  return {
    medium: 'kcl-aqueous',
    basis: solution.basis,
    nominal: solution.nominal,
    certifiedConductivityUsCm: at25.conductivityUsCm,
    referenceTemperatureC: 25,
    expandedUncertaintyUsCm: 2 * at25.relativeStandardUncertainty * at25.conductivityUsCm,
    coverageFactor: 2,
    temperatureTable: null,
  };
}

export async function planComparison(plan: PlannedComparison): Promise<PlannedAnswer> {
  const { solution, tolerancePercent, rule } = plan;
  const lot =
    solution.by === 'lot'
      ? await readLot(solution.standardId)
      : refusingByScience(() => lotOfBasis(solution));
  return refusingByScience(() => {
    // A probe that is exactly right shows what the method can do.
    const trial = { ...plan, lot, cellConstantPerCm: 1 };
    const reference = evaluateCheck({ ...trial, conductivityUsCm: 1 }).referenceUsCm;
    const result = evaluateCheck({ ...trial, conductivityUsCm: reference });
    const { expandedUncertaintyPercent, coverageFactor } = result;
    const method = assessMethod({
      expandedUncertainty: expandedUncertaintyPercent,
      tolerance: tolerancePercent,
      rule,
      coverageFactor,
    });
    return {
      canDecide: method.canDecideWithin,
      sentence: sentenceOf(method.canDecideWithin, result.budget),
      referenceUsCm: reference,
      expandedUncertaintyPercent,
      coverageFactor,
      acceptanceLimitPercent: method.acceptanceLimit,
      toleranceToUncertainty: method.toleranceToUncertainty,
      probabilityOutsideAtLimit: method.probabilityOutsideAtLimit,
      source:
        solution.by === 'basis'
          ? figureOfBasis({ ...solution, temperatureC: plan.temperatureC }).source
          : result.referenceSource,
      budget: result.budget.map((row) => ({
        name: row.name,
        contributionPercent: row.contribution,
        sharePercent: 100 * row.share,
      })),
    };
  });
}

function sentenceOf(canDecide: boolean, budget: { name: string; share: number }[]): string {
  const largest = [...budget].sort((one, other) => other.share - one.share)[0];
  if (canDecide) return 'This method can decide this tolerance under this rule.';
  return `This method cannot decide this tolerance under this rule: no result could be clearly within. The largest part of U is the ${largest?.name ?? 'method'}; make that smaller first, or widen the tolerance if the process allows.`;
}

/** A calibration in words and figures, written once for the screen, the record on paper and the export. */
import type { Judgement, Verdict } from '../contracts/calibrations.ts';
import type {
  CaptureSource,
  CommandState,
  ExclusionCode,
  RunStep,
  SignatureMeaning,
} from '../contracts/vocabulary.ts';
import { formatNumber, formatSigned, uncertaintyPlace, type ConductivityUnit, NO_VALUE } from './numbers.ts';

type Words<Code extends string> = Readonly<Record<Code, string>>;

export const STEP_LABELS: Words<RunStep> = {
  identify: 'right probe',
  'pre-checks': 'before you begin',
  hold: 'hold the point',
  'as-found-process': 'as found, in process',
  'as-found': 'as found',
  clean: 'clean',
  'zero-in-air': 'zero in air',
  'as-found-cleaned': 'as found, cleaned',
  decide: 'leave or adjust',
  'second-point': 'second point',
  'temperature-sensor': 'temperature sensor',
  'as-left': 'as left',
  reinstall: 'put back',
  review: 'review',
  sign: 'sign',
};

export const EXCLUSION_LABELS: Words<ExclusionCode> = {
  bubble: 'bubble on the cell',
  'not-immersed': 'cell not fully covered',
  disturbed: 'disturbed while reading',
  'wrong-solution': 'wrong solution',
  'typing-slip': 'slip in typing',
  'instrument-fault': 'fault of an instrument',
};

export const SOURCE_LABELS: Words<CaptureSource> = { stream: 'from the probe', typed: 'typed' };

export const MEANING_LABELS: Words<SignatureMeaning> = {
  performed: 'Performed',
  approved: 'Approved',
  returned: 'Returned',
};

export const COMMAND_LABELS: Words<CommandState> = {
  waiting: 'sent, the device has not confirmed yet',
  confirmed: 'confirmed by the device',
  failed: 'not confirmed: an open item',
};

/** Digits after the point that two significant digits of U call for. */
export function decimalsOf(expandedUncertainty: number): number {
  return expandedUncertainty > 0 ? Math.max(0, uncertaintyPlace(expandedUncertainty)) : 2;
}

/** Five significant digits, as a transmitter resolves them; the raw bench figure has no U. */
export function benchConductivity(conductivityUsCm: number | null, unit: ConductivityUnit): string {
  if (conductivityUsCm === null) return NO_VALUE;
  const value = unit === 'mS/cm' ? conductivityUsCm / 1000 : conductivityUsCm;
  const whole = Math.floor(Math.log10(Math.max(Math.abs(value), 1))) + 1;
  return formatNumber(value, { decimals: Math.max(0, Math.min(3, 5 - whole)) });
}

/** One unit for all readings of a step: figures that change unit between replicates are misread. */
export function benchUnit(values: readonly (number | null)[]): ConductivityUnit {
  const highest = Math.max(0, ...values.map((value) => value ?? 0));
  return highest >= 10_000 ? 'mS/cm' : 'µS/cm';
}

/** Five significant digits, as transmitters keep it. */
export const cellConstantText = (perCm: number | null): string =>
  formatNumber(perCm, { significantDigits: 5, unit: 'cm⁻¹' });

export interface StateFigures {
  /** What the probe showed and what the solution is, in `unit`. */
  probe: string;
  reference: string;
  error: string;
  uncertainty: string;
}

/** The figures of one state as they stand in a row: U with two significant digits, the error to match. */
export function stateFigures(verdict: Verdict, unit: ConductivityUnit): StateFigures {
  const { errorPercent, expandedUncertaintyPercent: U } = verdict;
  const decimals = decimalsOf(U);
  return {
    probe: benchConductivity(verdict.meanUsCm, unit),
    reference: benchConductivity(verdict.referenceUsCm, unit),
    error: formatSigned(errorPercent, decimals, '%'),
    uncertainty: formatNumber(U, { decimals, unit: '%' }),
  };
}

/** `Error −1.10 %. With U it could be as far as −1.90 %, and the tolerance is 2 %.` */
export function verdictSentence(verdict: Verdict, tolerancePercent: number): string {
  const { errorPercent, expandedUncertaintyPercent: U } = verdict;
  const decimals = decimalsOf(U);
  const farthest = errorPercent + (errorPercent < 0 ? -U : U);
  const tolerance = formatNumber(tolerancePercent, { unit: '%' });
  return `Error ${formatSigned(errorPercent, decimals, '%')}. With U it could be as far as ${formatSigned(farthest, decimals, '%')}, and the tolerance is ${tolerance}.`;
}

/** The change of one state to another, with whether it stands out of its own uncertainty. */
export function changeWords(change: NonNullable<Judgement['fouling']>): string {
  const decimals = decimalsOf(change.expandedUncertaintyPercent);
  const figure = formatSigned(change.changePercent, decimals, '%');
  const U = formatNumber(change.expandedUncertaintyPercent, { decimals, unit: '%' });
  return `${figure} (U ${U}${change.isSignificant ? '' : ', too small to tell from noise'})`;
}

/** What the tolerance strip needs of a verdict. */
export function verdictStrip(verdict: Verdict, tolerancePercent: number, what: string) {
  return {
    tolerance: tolerancePercent,
    guardBand: tolerancePercent - verdict.acceptanceLimitPercent,
    error: verdict.errorPercent,
    expandedUncertainty: verdict.expandedUncertaintyPercent,
    coverageFactor: verdict.coverageFactor,
    outcome: verdict.outcome,
    what,
  };
}

/** Pure: adjust, leave or replace. Adjusting without ground only moves a probe by the noise of the comparison. */
import type { Judgement, Verdict } from '../../../shared/contracts/calibrations.ts';
import { formatNumber, formatSigned } from '../../../shared/format/numbers.ts';
import { adjustmentGuard, changeScore } from '../../../shared/science/fouling.ts';

export type Advice = NonNullable<Judgement['advice']>;

/** A cell this far from its nameplate is bent, coated or worn: another constant would hide it [common practice]. */
const largestFromNominalPercent = 10;
/** A jump beyond this between two visits needs its reason on record [common practice]. */
const jumpPercent = 3;
/** Transmitters keep a cell constant to five significant digits. */
const digitsKept = 5;

export function roundCellConstant(perCm: number): number {
  const multiple = 10 ** (digitsKept - 1 - Math.floor(Math.log10(perCm)));
  return Math.round(perCm * multiple) / multiple;
}

export interface AdviceInput {
  cleaned: Verdict;
  nominalCellConstantPerCm: number;
  tolerancePercent: number;
  /** Of the tolerance: below it nothing is adjusted. */
  adjustmentShare: number;
  lastAsLeft: { errorPercent: number; expandedUncertaintyPercent: number; correlation: number } | null;
}

export function adviseOn(input: AdviceInput): Advice {
  const { cleaned, nominalCellConstantPerCm } = input;
  const score = scoreOf(input);
  const implied = cleaned.impliedCellConstantPerCm;
  if (implied === null)
    return {
      decision: 'replace',
      sentence:
        'The probe shows nothing in the solution: no cell constant could mend that. Inspect or replace it.',
      normalisedError: score,
      proposedCellConstantPerCm: cleaned.cellConstantPerCm,
      changePercent: 0,
      needsReason: true,
    };
  const proposed = roundCellConstant(implied);
  const changePercent = 100 * (proposed / cleaned.cellConstantPerCm - 1);
  const common = { normalisedError: score, proposedCellConstantPerCm: proposed, changePercent };
  const fromNominalPercent = 100 * (proposed / nominalCellConstantPerCm - 1);
  if (Math.abs(fromNominalPercent) > largestFromNominalPercent)
    return {
      ...common,
      decision: 'replace',
      sentence: `The cell constant would lie ${formatSigned(fromNominalPercent, 1, '%')} from nominal, beyond ${largestFromNominalPercent} %: inspect or replace the probe.`,
      needsReason: true,
    };
  const ground = groundToLeave(input, score);
  const isJump = Math.abs(changePercent) > jumpPercent;
  if (ground !== null) return { ...common, decision: 'leave', sentence: ground, needsReason: true };
  return {
    ...common,
    decision: 'adjust',
    sentence: `The error ${formatSigned(cleaned.errorPercent, 2, '%')} is beyond its adjustment limit and its uncertainty: adjust the cell constant by ${formatSigned(changePercent, 2, '%')}.`,
    needsReason: isJump,
  };
}

/** E_n against what was left last time, or against zero when nothing is known of it. */
function scoreOf({ cleaned, lastAsLeft }: AdviceInput): number {
  const now = { error: cleaned.errorPercent, expandedUncertainty: cleaned.expandedUncertaintyPercent };
  if (!lastAsLeft) return Math.abs(now.error) / now.expandedUncertainty;
  const { errorPercent, expandedUncertaintyPercent, correlation } = lastAsLeft;
  return changeScore({
    first: { error: errorPercent, expandedUncertainty: expandedUncertaintyPercent },
    second: now,
    correlation,
  });
}

function groundToLeave(input: AdviceInput, score: number): string | null {
  const { cleaned, tolerancePercent, adjustmentShare, lastAsLeft } = input;
  const size = Math.abs(cleaned.errorPercent);
  const en = `Eₙ ${formatNumber(score, { decimals: 1 })}`;
  const error = formatSigned(cleaned.errorPercent, 2, '%');
  const uncertainty = formatNumber(cleaned.expandedUncertaintyPercent, { decimals: 2, unit: '%' });
  if (size <= cleaned.expandedUncertaintyPercent)
    return `Leave it: the error ${error} is no larger than its U of ${uncertainty} (${en}). Adjusting would follow the noise.`;
  const limitPercent = adjustmentShare * tolerancePercent;
  if (size <= limitPercent)
    return `Leave it: the error ${error} is below the adjustment limit of ${formatNumber(limitPercent, { decimals: 2, unit: '%' })} (${en}).`;
  if (!lastAsLeft) return null;
  const guard = adjustmentGuard({
    asLeftBefore: {
      error: lastAsLeft.errorPercent,
      expandedUncertainty: lastAsLeft.expandedUncertaintyPercent,
    },
    cleanedNow: { error: cleaned.errorPercent, expandedUncertainty: cleaned.expandedUncertaintyPercent },
    acceptanceLimit: cleaned.acceptanceLimitPercent,
    correlation: lastAsLeft.correlation,
  });
  return guard.advice === 'leave'
    ? `Leave it: the change since the last visit is not significant (${en}) and the error lies within its acceptance limit.`
    : null;
}

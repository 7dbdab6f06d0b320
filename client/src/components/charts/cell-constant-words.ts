import { formatDate } from '../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../shared/format/numbers.ts';
import type { CellConstantInput } from './cell-constant-geometry.ts';

/** The chart in sentences: what is in use, what was determined last, how far that is, and what is due. */
export function cellConstantWords(input: CellConstantInput): string {
  const timeZone = input.timeZone ?? 'UTC';
  const date = (t: number) => formatDate(t, { timeZone });
  const constant = (value: number) => formatNumber(value, { decimals: 4 });
  const inUse = input.constants.at(-1);
  const last = input.points.at(-1);
  const sentences = ['Cell constant in cm⁻¹.'];
  if (inUse) sentences.push(`In use ${constant(inUse.cellConstantPerCm)} since ${date(inUse.from)}.`);
  if (last) {
    const U = last.expandedUncertaintyPerCm;
    const withU = U == null ? '' : ` with U ${constant(U)}`;
    sentences.push(`Last determined ${constant(last.cellConstantPerCm)}${withU} on ${date(last.at)}.`);
  } else sentences.push('Not determined yet.');
  sentences.push(
    `Tolerance ±${formatNumber(input.tolerancePercent, { unit: '%' })} around the constant in use, guard band ${formatNumber(input.guardBandPercent, { significantDigits: 2, unit: '%' })}.`,
  );
  if (input.due != null) sentences.push(`Due ${date(input.due)}.`);
  return sentences.join(' ');
}

import type { Outcome } from '../contracts/vocabulary.ts';
import { capitalise, OUTCOME_LABELS } from './labels.ts';
import { formatNumber, formatSigned, uncertaintyPlace } from './numbers.ts';
import type { StripInput } from './strip-geometry.ts';

/**
 * The strip in words: for screen readers and exports. A closed strip says nothing about the result, because the
 * person capturing must not be steered by it.
 */
export function stripWords(input: StripInput, outcome: Outcome | null): string {
  const unit = input.unit ?? '%';
  const tolerance = `tolerance ±${formatNumber(input.tolerance, { unit })}`;
  if (input.closed) return `${capitalise(input.closed)}. ${capitalise(tolerance)}.`;
  if (input.error == null || outcome === null) return `No result yet. ${capitalise(tolerance)}.`;
  const U = input.expandedUncertainty;
  const decimals = U != null && U > 0 ? Math.max(0, uncertaintyPlace(U)) : 2;
  const figure = (value: number) => formatNumber(value, { decimals, unit });
  const coarse = Math.max(1, decimals - 1);
  const parts = [
    `${input.what ?? 'Last'} error ${formatSigned(input.error, decimals, unit)}`,
    ...(U == null ? [] : [`U ${figure(U)} (k = ${formatNumber(input.coverageFactor ?? 2)})`]),
    tolerance,
    `guard band ${figure(input.guardBand)}`,
  ];
  const sentences = [capitalise(OUTCOME_LABELS[outcome]) + '.', parts.join(', ') + '.'];
  if (input.guardBand >= input.tolerance) {
    sentences.push('U is as large as the tolerance, so this method cannot decide.');
  }
  const earlier = (input.earlier ?? []).slice(0, 3);
  if (earlier.length > 0) {
    const figures = earlier.map((e, i) =>
      formatSigned(e, coarse, i === earlier.length - 1 ? unit : undefined),
    );
    sentences.push(`Before that ${figures.join(', ')}.`);
  }
  if (input.forecast != null) sentences.push(`Forecast today ${formatSigned(input.forecast, coarse, unit)}.`);
  return sentences.join(' ');
}

import type { CaptureStep, RunStep } from '../../../../../shared/contracts/vocabulary.ts';
import type { Criteria } from '../../../../../shared/contracts/procedures.ts';

/** Steps in a reference solution: replicates, and an error at the end. */
export const SOLUTION_STEPS = ['as-found', 'as-found-cleaned', 'second-point', 'as-left'] as const;
export type SolutionStep = (typeof SOLUTION_STEPS)[number];
export const isSolutionStep = (step: RunStep): step is SolutionStep =>
  (SOLUTION_STEPS as readonly string[]).includes(step);

export type Comparison = 'portable-meter' | 'grab-sample' | 'nothing';

/** Readings a step needs before it can be finished. */
export function neededCaptures(step: CaptureStep, comparedWith: Comparison, criteria: Criteria): number {
  if (isSolutionStep(step)) return criteria.minReplicates;
  return step === 'as-found-process' && comparedWith === 'portable-meter' ? criteria.minReplicates : 1;
}

/** A typed value this many times off the other readings of its step is asked about once more. */
const ORDER = 3;
export function isFarFrom(value: number, others: readonly number[]): boolean {
  return others.some((other) => other > 0 && (value / other > ORDER || other / value > ORDER));
}

import { z } from 'zod';
import { id, instant, listQuery, reason, shortText } from './common.ts';
import { probeKinds, runSteps, type RunStep } from './vocabulary.ts';

/** Numbers a run is held to; each default's origin stands in the service that offers it. */
export const criteria = z.object({
  minReplicates: z.number().int().min(3).max(20),
  stabilityWindowS: z.number().int().min(10).max(600),
  stabilityRangePercent: z.number().gt(0).max(5),
  stabilitySlopePercentPerMin: z.number().gt(0).max(5),
  temperatureRangeC: z.number().gt(0).max(2),
  stabilityTimeoutS: z.number().int().min(60).max(3600),
  repeatabilityLimitPercent: z.number().gt(0).max(5),
  adjustmentShareOfTolerance: z.number().min(0).max(1),
  /** Below this no open-beaker comparison: compare in line instead. */
  openBeakerLimitUsCm: z.number().min(0).max(1000),
});
export type Criteria = z.infer<typeof criteria>;

export const procedure = z.object({
  id,
  code: z.string(),
  name: z.string(),
  version: z.number().int().min(1),
  probeKinds: z.array(z.enum(probeKinds)).min(1),
  steps: z.array(z.enum(runSteps)),
  criteria,
  effectiveFrom: instant,
  replacedAt: instant.nullable(),
  changeReason: z.string().nullable(),
  can: z.object({ change: z.boolean() }),
});
export type Procedure = z.infer<typeof procedure>;

/** Issues the next version; versions in use by a run never change. */
export const issueProcedure = z.object({
  name: shortText,
  probeKinds: z.array(z.enum(probeKinds)).min(1),
  steps: z.array(z.enum(runSteps)).min(5),
  criteria,
  basedOnVersion: z.number().int().min(1),
  reason,
});
export type IssueProcedure = z.infer<typeof issueProcedure>;

export const proceduresQuery = listQuery.extend({
  code: z.string().max(60).optional(),
  /** Earlier versions as well. */
  all: z.enum(['1']).optional(),
});
export type ProceduresQuery = z.infer<typeof proceduresQuery>;

/** Without these a run proves nothing, whoever shortens the procedure. */
export const indispensableSteps = [
  'identify',
  'pre-checks',
  'as-found',
  'decide',
  'as-left',
  'review',
  'sign',
] as const;

/** Zero in air is dry: before the first solution (inductive), or after cleaning (electrodes). */
const movableStep: RunStep = 'zero-in-air';

/** What is wrong with an order of steps, in a sentence, or null. As found always precedes cleaning and deciding. */
export function stepsIssue(steps: readonly RunStep[]): string | null {
  if (new Set(steps).size !== steps.length) return 'Each step stands once.';
  const missing = indispensableSteps.find((step) => !steps.includes(step));
  if (missing) return `A run needs the step “${missing}”.`;
  if (steps.includes('clean') !== steps.includes('as-found-cleaned'))
    return 'Cleaning and as found (cleaned) belong together: what cleaning did is measured.';
  const fixed = steps.filter((step) => step !== movableStep);
  const late = fixed.find((step, at) => at > 0 && runSteps.indexOf(step) < runSteps.indexOf(fixed[at - 1]!));
  if (late) return `The step “${late}” stands too late.`;
  const zeroAt = steps.indexOf(movableStep);
  if (zeroAt < 0) return null;
  const before = steps[zeroAt - 1];
  const after = steps[zeroAt + 1];
  const isDry = after === 'as-found' || (before === 'clean' && after === 'as-found-cleaned');
  return isDry
    ? null
    : 'Zero in air stands before the first solution, or between cleaning and as found (cleaned).';
}

/** Every run has these, whatever its probe. */
export const necessarySteps: readonly RunStep[] = [
  'identify',
  'pre-checks',
  'hold',
  'as-found',
  'as-found-cleaned',
  'decide',
  'as-left',
  'reinstall',
  'review',
  'sign',
];

/**
 * Why these steps cannot be a procedure, in words; null when they can. They keep the order of `runSteps`, except that
 * zero in air may come earlier, up to right after the hold: an inductive probe shows its zero dry and first.
 */
export function stepOrderProblem(steps: readonly RunStep[]): string | null {
  const twice = steps.find((step, index) => steps.indexOf(step) !== index);
  if (twice) return `The step ${twice} is named twice.`;
  const missing = necessarySteps.find((step) => !steps.includes(step));
  if (missing) return `The step ${missing} is missing.`;
  const fixed = steps.filter((step) => step !== 'zero-in-air').map((step) => runSteps.indexOf(step));
  const late = fixed.findIndex((place, index) => index > 0 && place < (fixed[index - 1] ?? 0));
  if (late > 0)
    return `The step ${runSteps[fixed[late] ?? 0]} must come before ${runSteps[fixed[late - 1] ?? 0]}.`;
  const zero = steps.indexOf('zero-in-air');
  if (zero >= 0 && (zero < steps.indexOf('hold') || zero > steps.indexOf('decide')))
    return 'The step zero-in-air belongs between hold and decide.';
  return null;
}

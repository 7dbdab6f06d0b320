import type { Calibration } from '../../../../shared/contracts/calibrations.ts';
import type {
  CalibrationStatus,
  DecisionRule,
  PromptKind,
  RunStep,
} from '../../../../shared/contracts/vocabulary.ts';

type Words<Code extends string> = Readonly<Record<Code, string>>;

export const STATUS_LABELS: Words<CalibrationStatus> = {
  running: 'running',
  stopped: 'stopped for safety',
  signed: 'signed, waits for approval',
  returned: 'returned',
  approved: 'approved',
  amended: 'amended',
};

export const PROMPT_LABELS: Words<PromptKind> = { 'due-soon': 'due soon', overdue: 'overdue' };

/** The part of U that a rule keeps clear of the limit. */
const GUARD_SHARE: Readonly<Record<DecisionRule, number>> = {
  simple: 0,
  'guarded-u': 1,
  'guarded-0.83u': 0.83,
};

/** The guard band to draw before a result is known: of the U that was planned. */
export function plannedGuardBand(run: Pick<Calibration, 'decisionRule' | 'plan'>): number {
  return GUARD_SHARE[run.decisionRule] * run.plan.expandedUncertaintyPercent;
}

/** `Step 8 of 15` */
export function stepPlace(steps: readonly { step: RunStep }[], step: RunStep): string {
  return `Step ${steps.findIndex((one) => one.step === step) + 1} of ${steps.length}`;
}

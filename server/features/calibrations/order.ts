/** Pure: which step comes next, and what a step still lacks. The procedure's own list is the order. */
import type { StepData } from '../../../shared/contracts/calibrations.ts';
import type { Criteria } from '../../../shared/contracts/procedures.ts';
import { captureSteps, type CaptureStep, type RunStep } from '../../../shared/contracts/vocabulary.ts';

export type Decision = 'leave' | 'adjust';

/** A probe that is left as it is was not touched after the cleaned state: as left equals cleaned and is not repeated. */
export function stepsOfRun(procedureSteps: readonly RunStep[], decision: Decision | null): RunStep[] {
  return procedureSteps.filter((step) => step !== 'as-left' || decision !== 'leave');
}

export function currentStepOf(steps: readonly RunStep[], done: ReadonlySet<RunStep>): RunStep | null {
  return steps.find((step) => !done.has(step)) ?? null;
}

export const isCaptureStep = (step: RunStep): step is CaptureStep =>
  (captureSteps as readonly string[]).includes(step);

/** Steps whose readings are compared with a reference solution: replicates are needed, and a portion of the liquid. */
export const solutionSteps = ['as-found', 'as-found-cleaned', 'second-point', 'as-left'] as const;
export type SolutionStep = (typeof solutionSteps)[number];
export const isSolutionStep = (step: string): step is SolutionStep =>
  (solutionSteps as readonly string[]).includes(step);

export interface CountedCapture {
  step: CaptureStep;
  referenceTemperatureC: number | null;
  referenceConductivityUsCm: number | null;
}

interface Lack {
  path: string;
  message: string;
}

/** What is missing before `data.step` can be finished; `captures` are those of the step that count. */
export function lacksOf(data: StepData, captures: readonly CountedCapture[], criteria: Criteria): Lack[] {
  const needed = neededCaptures(data, criteria);
  const usable = captures.filter((capture) => isUsable(data, capture));
  if (usable.length >= needed) return [];
  const what = describeCapture(data);
  return [
    { path: 'captures', message: `${needed} captured ${what} are needed; ${usable.length} count so far.` },
  ];
}

function neededCaptures(data: StepData, criteria: Criteria): number {
  if (!isCaptureStep(data.step)) return 0;
  if (isSolutionStep(data.step)) return criteria.minReplicates;
  // A comparison in the running water is made of pairs; a zero and a temperature are single observations.
  return data.step === 'as-found-process' && data.comparedWith === 'portable-meter'
    ? criteria.minReplicates
    : 1;
}

function isUsable(data: StepData, capture: CountedCapture): boolean {
  if (data.step === 'temperature-sensor') return capture.referenceTemperatureC !== null;
  if (data.step === 'as-found-process' && data.comparedWith === 'portable-meter')
    return capture.referenceConductivityUsCm !== null;
  return true;
}

function describeCapture(data: StepData): string {
  if (data.step === 'temperature-sensor') return 'readings with the thermometer’s own temperature';
  if (data.step === 'as-found-process' && data.comparedWith === 'portable-meter')
    return 'readings paired with the portable meter';
  return 'readings';
}

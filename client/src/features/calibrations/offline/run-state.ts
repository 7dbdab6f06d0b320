import type { Calibration, Capture } from '../../../../../shared/contracts/calibrations.ts';
import type { CaptureStep, RunStep } from '../../../../../shared/contracts/vocabulary.ts';
import type { Deed, QueuedDeed } from './deeds.ts';
import { keyOf } from './deeds.ts';

/** Where a captured reading lies: on the server, on this phone until it is sent, or refused by the server. */
export type Whereabouts = 'server' | 'phone' | 'refused';

export interface RunCapture {
  key: string;
  step: CaptureStep;
  position: number;
  source: Capture['source'];
  conductivityUsCm: number;
  temperatureC: number;
  referenceTemperatureC: number | null;
  referenceConductivityUsCm: number | null;
  isStable: boolean;
  capturedAt: string;
  whereabouts: Whereabouts;
  /** Why it does not count, whether the server knows yet or not. */
  excluded: { code: string; note: string | null } | null;
  refusal: QueuedDeed['refusal'];
}

export interface RunView {
  calibration: Calibration;
  /** Server state plus what was done since on this phone. */
  steps: { step: RunStep; state: 'done' | 'current' | 'waiting'; capturedAt: string | null; data: unknown }[];
  currentStep: RunStep | null;
  captures: RunCapture[];
  /** Not sent yet. */
  waiting: number;
  /** Sent and not accepted; they stay until somebody has dealt with them. */
  refused: QueuedDeed[];
}

/** The run as it stands at the probe: what the server has, and the deeds it has not heard of, in their order. */
export function runWithDeeds(calibration: Calibration, queue: readonly QueuedDeed[]): RunView {
  const own = queue
    .filter((entry) => entry.deed.calibrationId === calibration.id)
    .sort((a, b) => a.order - b.order)
    .filter((entry) => !isOnServer(entry.deed, calibration));
  const start: RunView = {
    calibration,
    steps: calibration.steps.map(({ step, state, capturedAt, data }) => ({ step, state, capturedAt, data })),
    currentStep: calibration.currentStep,
    captures: calibration.captures.map(fromServer),
    waiting: own.filter((entry) => entry.refusal === null).length,
    refused: own.filter((entry) => entry.refusal !== null),
  };
  return own.reduce(withDeed, start);
}

/** The answer to a deed may get lost on the way back; the server's own state then tells that it arrived. */
export function isOnServer(deed: Deed, calibration: Calibration): boolean {
  if (deed.kind === 'capture') return calibration.captures.some((capture) => capture.key === keyOf(deed));
  if (deed.kind === 'exclude')
    return calibration.captures.some((one) => one.key === deed.captureKey && one.excluded !== null);
  return calibration.steps.some((one) => one.step === deed.body.data.step && one.state === 'done');
}

function withDeed(view: RunView, entry: QueuedDeed): RunView {
  const { deed, refusal } = entry;
  if (deed.kind === 'capture') {
    return { ...view, captures: [...view.captures, fromPhone(deed, refusal, view.captures)] };
  }
  if (refusal !== null) return view;
  if (deed.kind === 'exclude') {
    const { code, note } = deed.body;
    return {
      ...view,
      captures: view.captures.map((one) =>
        one.key === deed.captureKey ? { ...one, excluded: { code, note } } : one,
      ),
    };
  }
  return withStepDone(view, deed.body.data.step, deed.body.capturedAt, deed.body.data);
}

/** Steps are done in their order only: a deed for another step changes nothing here, the server will say why. */
function withStepDone(view: RunView, step: RunStep, capturedAt: string, data: unknown): RunView {
  if (view.currentStep !== step) return view;
  const known = isLeft(data) ? view.steps.filter((one) => one.step !== 'as-left') : view.steps;
  const at = known.findIndex((one) => one.step === step);
  const steps = known.map((one, i) => {
    if (i === at) return { ...one, state: 'done' as const, capturedAt, data };
    return i === at + 1 ? { ...one, state: 'current' as const } : one;
  });
  return { ...view, steps, currentStep: steps[at + 1]?.step ?? null };
}

/** A probe left as it is was not touched after the cleaned state: as left equals it and is not captured again. */
function isLeft(data: unknown): boolean {
  return typeof data === 'object' && data !== null && 'decision' in data && data.decision === 'leave';
}

function fromServer(capture: Capture): RunCapture {
  return {
    key: capture.key,
    step: capture.step,
    position: capture.position,
    source: capture.source,
    conductivityUsCm: capture.conductivityUsCm,
    temperatureC: capture.temperatureC,
    referenceTemperatureC: capture.referenceTemperatureC,
    referenceConductivityUsCm: capture.referenceConductivityUsCm,
    isStable: capture.isStable,
    capturedAt: capture.capturedAt,
    whereabouts: 'server',
    excluded: capture.excluded && { code: capture.excluded.code, note: capture.excluded.note },
    refusal: null,
  };
}

function fromPhone(
  { body }: Extract<Deed, { kind: 'capture' }>,
  refusal: QueuedDeed['refusal'],
  known: readonly RunCapture[],
): RunCapture {
  const before = known.filter((one) => one.step === body.step && one.whereabouts !== 'refused');
  return {
    key: body.key,
    step: body.step,
    position: before.reduce((highest, one) => Math.max(highest, one.position), 0) + 1,
    source: body.source,
    conductivityUsCm: body.conductivityUsCm,
    temperatureC: body.temperatureC,
    referenceTemperatureC: body.referenceTemperatureC,
    referenceConductivityUsCm: body.referenceConductivityUsCm,
    isStable: body.isStable,
    capturedAt: body.capturedAt,
    whereabouts: refusal === null ? 'phone' : 'refused',
    excluded: null,
    refusal,
  };
}

/** The captured readings of a step, in their order. */
export function capturesOf(view: RunView, step: RunStep): RunCapture[] {
  return view.captures.filter((capture) => capture.step === step);
}

/** Those that count: neither excluded nor refused. */
export function countingOf(view: RunView, step: RunStep): RunCapture[] {
  return capturesOf(view, step).filter(
    (capture) => capture.excluded === null && capture.whereabouts !== 'refused',
  );
}

/** When the current step began: the end of the one before. */
export function stepBegan(view: RunView): number {
  return latest([
    view.calibration.startedAt,
    ...view.steps.map((one) => (one.state === 'done' ? one.capturedAt : null)),
  ]);
}

/** Since when the current step waits for its next reading: its beginning, or its last capture. */
export function waitingSince(view: RunView): number {
  const captures = view.captures.filter((one) => one.step === view.currentStep);
  return Math.max(stepBegan(view), latest(captures.map((one) => one.capturedAt)));
}

const latest = (moments: readonly (string | null)[]): number =>
  moments.reduce((last, moment) => Math.max(last, moment === null ? 0 : Date.parse(moment)), 0);

import { useState } from 'react';
import type { CaptureReading, StepData } from '../../../../../shared/contracts/calibrations.ts';
import type { CaptureStep } from '../../../../../shared/contracts/vocabulary.ts';
import { benchUnit } from '../../../../../shared/format/calibration-words.ts';
import { DISPLAY_UNIT_LABELS } from '../../../../../shared/format/labels.ts';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { captureDeed } from '../offline/deeds.ts';
import { clockOffsetMs } from '../offline/phone-queue.ts';
import { capturesOf, countingOf, stepBegan, waitingSince } from '../offline/run-state.ts';
import { plannedGuardBand } from '../words.ts';
import { useBench } from './bench-context.ts';
import { BenchFoot } from './bench-foot.tsx';
import { isFarFrom, isSolutionStep, neededCaptures } from './bench-figures.ts';
import { useStableSignal } from './bench-senses.ts';
import { placeWords, settleLimits } from './capture-model.ts';
import { HoldButton } from './hold-button.tsx';
import { LiveFigure } from './live-figure.tsx';
import { RefusedDeeds } from './refused-deeds.tsx';
import { Replicates } from './replicates.tsx';
import type { ReferenceValues, TypedValues } from './typed-entry.tsx';
import { ReferenceEntry, TypedEntry } from './typed-entry.tsx';
import { SettlePanel } from './settle-panel.tsx';
import { SettleTrace } from './settle-trace.tsx';
import { judgeSettling, timeoutLeftS } from './stability.ts';
import { useStream } from './use-stream.ts';

const NO_VALUES: TypedValues = { conductivityUsCm: null, temperatureC: null };
const NO_REFERENCE: ReferenceValues = { temperatureC: null, conductivityUsCm: null, comparedWith: 'nothing' };

/** Readings of one state of the probe: watch it settle, press and hold, as often as the procedure asks. */
export function CaptureScreen({ step }: { step: CaptureStep }) {
  const { view, add, finish } = useBench();
  const { calibration: run } = view;
  const { criteria } = run.procedure;
  const stream = useStream(run.probeId);
  const [typed, setTyped] = useState(NO_VALUES);
  const [reference, setReference] = useState(NO_REFERENCE);
  const [wantsMore, setWantsMore] = useState(false);
  /** The reading captured last: each counts once. */
  const [takenAt, setTakenAt] = useState<string | null>(null);
  const limits = settleLimits(step, criteria);
  // Steady readings of the last bottle say nothing of this one: the window begins with the step.
  const sinceMs = stepBegan(view) - stream.deviceLagMs;
  const settling = judgeSettling(stream.points, limits, sinceMs);
  const leftS = timeoutLeftS(waitingSince(view), stream.nowMs, criteria.stabilityTimeoutS);
  const isStable = stream.reading !== null && settling.state === 'stable';
  const signal = useStableSignal(isStable);

  const captures = capturesOf(view, step);
  const counting = countingOf(view, step);
  const needed = neededCaptures(step, reference.comparedWith, criteria);
  const isComplete = counting.length >= needed && !wantsMore;
  const known = [stream.reading?.conductivityUsCm ?? null, ...captures.map((one) => one.conductivityUsCm)];
  // Without any reading yet, the unit that the display at the point is set to.
  const unit = known.some((value) => value !== null)
    ? benchUnit(known)
    : DISPLAY_UNIT_LABELS[run.displayUnit === 'mS/cm' ? 'mS/cm' : 'uS/cm'];
  const isTyped = stream.reading === null && !stream.isWaiting;
  const reading = isTyped ? typed : (stream.reading ?? NO_VALUES);
  const gate = captureGate();

  function captureGate(): string | null {
    if (reading.conductivityUsCm === null || reading.temperatureC === null)
      return isTyped
        ? 'Type both values'
        : stream.isWaiting
          ? 'Waiting for the probe'
          : 'The probe shows no value';
    if (Number.isNaN(reading.conductivityUsCm) || Number.isNaN(reading.temperatureC))
      return 'Type both as numbers';
    if (step === 'temperature-sensor' && !isNumber(reference.temperatureC)) return 'Type the thermometer';
    if (reference.comparedWith === 'portable-meter' && !isNumber(reference.conductivityUsCm))
      return 'Type the meter';
    if (isTyped || step === 'as-found-process') return null;
    if (stream.reading!.quality === 'bad') return 'The device calls it bad';
    if (stream.reading!.at === takenAt) return 'Wait for a new reading';
    return isStable || leftS <= 0 ? null : 'Wait until stable';
  }

  const stepData = (): StepData =>
    step === 'as-found-process' ? { step, comparedWith: reference.comparedWith, note: null } : { step };

  const capture = async () => {
    const body: Omit<CaptureReading, 'key'> = {
      step,
      source: isTyped ? 'typed' : 'stream',
      conductivityUsCm: reading.conductivityUsCm!,
      temperatureC: reading.temperatureC!,
      referenceTemperatureC: step === 'temperature-sensor' ? reference.temperatureC : null,
      referenceConductivityUsCm:
        reference.comparedWith === 'portable-meter' ? reference.conductivityUsCm : null,
      boot: isTyped ? null : (stream.reading!.boot ?? null),
      n: isTyped ? null : (stream.reading!.n ?? null),
      isStable: isTyped || isStable,
      isConfirmed: false,
      capturedAt: new Date().toISOString(),
      clockOffsetMs: clockOffsetMs(),
    };
    setTyped(NO_VALUES);
    setTakenAt(stream.reading?.at ?? null);
    setWantsMore(false);
    await add(captureDeed(run.id, body));
    // A single observation needs no second look: the step is over with it.
    if (needed === 1 && !isTyped && counting.length === 0) await finish(stepData());
  };

  const number = counting.length + 1;
  const isFar =
    isTyped &&
    isNumber(typed.conductivityUsCm) &&
    isFarFrom(
      typed.conductivityUsCm,
      counting.map((one) => one.conductivityUsCm),
    );
  return (
    <>
      <div className="bench-columns">
        <div>
          <LiveFigure
            reading={stream.reading}
            unit={unit}
            place={placeWords(step, run)}
            silence={stream.silence}
          />
          {isTyped ? (
            <TypedEntry values={typed} unit={unit} onChange={setTyped} isFar={isFar} />
          ) : (
            <>
              <SettleTrace
                points={stream.points}
                settling={settling}
                windowS={criteria.stabilityWindowS}
                limitRangeUsCm={
                  (limits.stabilityRangePercent / 100) *
                  Math.max(Math.abs(settling.conductivity?.mean ?? 0), limits.leastBaseUsCm ?? 0)
                }
                sinceMs={sinceMs}
              />
              <SettlePanel
                settling={settling}
                limits={limits}
                leftS={step === 'as-found-process' ? null : leftS}
              />
            </>
          )}
          <ReferenceEntry step={step} unit={unit} run={run} values={reference} onChange={setReference} />
        </div>
        <div>
          <Replicates captures={captures} needed={needed} unit={unit} />
          {isSolutionStep(step) ? (
            <div className="bench-cover">
              <ToleranceStrip
                size="bench"
                tolerance={run.tolerancePercent}
                guardBand={plannedGuardBand(run)}
                closed={`error shown after replicate ${needed}`}
              />
            </div>
          ) : null}
          <RefusedDeeds />
          <button
            type="button"
            className="bench-sound"
            aria-pressed={!signal.isMuted}
            onClick={() => signal.mute(!signal.isMuted)}
          >
            {signal.isMuted ? 'No sound when stable' : 'A sound when stable'}
          </button>
        </div>
      </div>
      <BenchFoot>
        {isComplete ? (
          <>
            <Button kind="primary" onClick={() => finish(stepData())}>
              {isSolutionStep(step) ? 'Show the error' : 'Go on'}
            </Button>
            <button type="button" className="bench-second" onClick={() => setWantsMore(true)}>
              Capture one more
            </button>
          </>
        ) : (
          <HoldButton
            isEnabled={gate === null}
            waiting={gate ?? ''}
            what={captureWords(needed, number, !isTyped && !isStable)}
            onHeld={() => void capture()}
          />
        )}
      </BenchFoot>
    </>
  );
}

const isNumber = (value: number | null): value is number => value !== null && !Number.isNaN(value);

function captureWords(needed: number, number: number, isUnstable: boolean): string {
  const what = needed === 1 ? 'the reading' : `replicate ${number}`;
  return isUnstable && needed > 1 ? `${what}, as not stable` : what;
}

import { useState } from 'react';
import type { Calibration, StepData } from '../../../../../shared/contracts/calibrations.ts';
import type { CaptureStep, RunStep } from '../../../../../shared/contracts/vocabulary.ts';
import { STEP_LABELS } from '../../../../../shared/format/calibration-words.ts';
import { Button } from '../../../components/ui/button.tsx';
import { useConnection } from '../../../lib/live-updates.ts';
import { stepDeed } from '../offline/deeds.ts';
import { phoneQueue, useMeasuredClock, useQueue } from '../offline/phone-queue.ts';
import { runWithDeeds } from '../offline/run-state.ts';
import { stepPlace } from '../words.ts';
import { BenchContext, useBench } from './bench-context.ts';
import { BenchFoot } from './bench-foot.tsx';
import { BenchHead } from './bench-head.tsx';
import { useWakeLock } from './bench-senses.ts';
import { CaptureScreen } from './capture-screen.tsx';
import { DecideScreen } from './decide-screen.tsx';
import { IdentifyScreen } from './identify-screen.tsx';
import { CleanScreen, HoldScreen, PreChecksScreen, ReinstallScreen } from './question-screens.tsx';
import { ReviewScreen, SignScreen } from './review-screens.tsx';
import { StepCaution } from './step-caution.tsx';
import { VerdictPanel } from './verdict-panel.tsx';

export interface BenchProps {
  calibration: Calibration;
  userId: number;
  timeZone: string;
}

/** A run at the probe: one step, one screen. Its state is the server's plus what waits on this phone. */
export function Bench({ calibration, userId, timeZone }: BenchProps) {
  useWakeLock();
  useMeasuredClock();
  const { entries } = useQueue();
  const connection = useConnection();
  const [shown, setShown] = useState<RunStep | null>(null);
  const view = runWithDeeds(calibration, entries);
  const add = phoneQueue.add;
  const finish = (data: StepData) => {
    if (isFollowedByCapture(view.steps, data.step)) setShown(data.step);
    return add(stepDeed(calibration.id, data, new Date().toISOString()));
  };
  const step = view.currentStep;
  const isOnline = connection.state === 'connected';
  return (
    <BenchContext value={{ view, userId, timeZone, isOnline, add, finish }}>
      <div className="bench">
        <BenchHead run={calibration} userId={userId} />
        {step ? (
          <>
            <p className="bench-step">
              {stepPlace(view.steps, shown ?? step)}
              <b>{STEP_LABELS[shown ?? step]}</b>
            </p>
            {shown ? (
              <ShownVerdict step={shown} onSeen={() => setShown(null)} />
            ) : (
              <>
                <StepCaution step={step} tags={calibration.hazardTags} />
                <StepScreen key={step} step={step} />
              </>
            )}
          </>
        ) : null}
      </div>
    </BenchContext>
  );
}

/** The question screens after a state show its verdict themselves; before another capture it needs a screen. */
function isFollowedByCapture(steps: readonly { step: RunStep }[], step: RunStep): boolean {
  const next = steps[steps.findIndex((one) => one.step === step) + 1]?.step;
  if (step === 'second-point') return true;
  return step === 'as-found' && next !== 'clean' && next !== 'decide';
}

/** A verdict that stands alone before the next thing is captured. */
function ShownVerdict({ step, onSeen }: { step: RunStep; onSeen: () => void }) {
  const { view } = useBench();
  const { judgement } = view.calibration;
  const verdict = step === 'second-point' ? judgement.secondPoint : judgement.asFound;
  return (
    <>
      <VerdictPanel verdict={verdict} what={STEP_LABELS[step]} />
      {step === 'second-point' && judgement.secondPointAgrees !== null ? (
        <p className="bench-say">
          {judgement.secondPointAgrees
            ? 'The two solutions agree about this probe within their uncertainties.'
            : 'The two solutions do not agree about this probe. One of them, or the range of the cell, is in doubt: say so in the note.'}
        </p>
      ) : null}
      <BenchFoot>
        <Button kind="primary" onClick={onSeen}>
          Go on
        </Button>
      </BenchFoot>
    </>
  );
}

function StepScreen({ step }: { step: RunStep }) {
  switch (step) {
    case 'identify':
      return <IdentifyScreen />;
    case 'pre-checks':
      return <PreChecksScreen />;
    case 'hold':
      return <HoldScreen />;
    case 'clean':
      return <CleanScreen />;
    case 'decide':
      return <DecideScreen />;
    case 'reinstall':
      return <ReinstallScreen />;
    case 'review':
      return <ReviewScreen />;
    case 'sign':
      return <SignScreen />;
    default:
      return <CaptureScreen step={step satisfies CaptureStep} />;
  }
}

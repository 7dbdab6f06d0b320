import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { useDocumentTitle } from '../../../lib/use-document-title.ts';
import { useHeadingFocus } from '../../../lib/use-heading-focus.ts';
import { paths } from '../../../paths.ts';
import { useCalibrationDeed } from '../api.ts';

/** Which probe this is, the way back, and the way out at any moment. */
export function BenchHead({ run, userId }: { run: Calibration; userId: number }) {
  const [isStopping, setIsStopping] = useState(false);
  const stop = useCalibrationDeed(run.id, 'stop', userId);
  const heading = useHeadingFocus();
  useDocumentTitle(`${run.pointName}, calibration`);
  return (
    <header className="bench-head">
      <Link className="bench-back" to={paths.calibrations.to()} aria-label="Back to your work; the run stays">
        <svg width="22" height="22" aria-hidden="true">
          <path d="M14 3L6 11l8 8" fill="none" stroke="currentColor" strokeWidth="2.5" />
        </svg>
      </Link>
      <div>
        <h1 ref={heading} tabIndex={-1}>
          {run.pointName}
        </h1>
        <small>
          {run.probeTag} · serial {run.probeSerial}
        </small>
      </div>
      <button type="button" className="bench-stop" onClick={() => setIsStopping(true)}>
        Stop for safety
      </button>
      <ConfirmDialog
        isOpen={isStopping}
        onClose={() => setIsStopping(false)}
        title="Stop for safety"
        sentence="The run ends here and everything captured stays. Nobody is asked to explain a stop twice, and the probe can be calibrated again at any time."
        confirmLabel="Stop this run"
        isDanger
        asksReason
        reasonHint="In a few words: what made you stop."
        onConfirm={(reason) => stop.mutateAsync({ reason, capturedAt: new Date().toISOString() })}
      />
    </header>
  );
}

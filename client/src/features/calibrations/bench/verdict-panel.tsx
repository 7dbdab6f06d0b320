import { useQuery } from '@tanstack/react-query';
import type { Verdict } from '../../../../../shared/contracts/calibrations.ts';
import { capitalise, OUTCOME_LABELS } from '../../../../../shared/format/labels.ts';
import { formatProbability } from '../../../../../shared/format/numbers.ts';
import { verdictSentence, verdictStrip } from '../../../../../shared/format/calibration-words.ts';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { OutcomeMark } from '../../../components/ui/marks.tsx';
import { calibrationsBrief } from '../api.ts';
import { useBench } from './bench-context.ts';

export interface VerdictPanelProps {
  /** Null until the server has judged the step. */
  verdict: Verdict | null;
  what: string;
}

/** The outcome of one state: words, sentence, strip. Judged on the server, once. */
export function VerdictPanel({ verdict, what }: VerdictPanelProps) {
  const { view, isOnline } = useBench();
  const { tolerancePercent, probeId, id } = view.calibration;
  const earlier = useEarlierErrors(probeId, id);
  if (!verdict) {
    return (
      <p className="bench-say" role="status">
        <b>{capitalise(what)} is captured.</b>{' '}
        {isOnline && view.waiting === 0
          ? 'The server works out the error.'
          : 'The error is worked out on the server as soon as the network is back.'}
      </p>
    );
  }
  return (
    <div role="status">
      <p className="verdict-outcome">
        <OutcomeMark outcome={verdict.outcome} size={26} hasWords={false} />
        {capitalise(OUTCOME_LABELS[verdict.outcome])}
      </p>
      <p className="bench-say">
        {verdictSentence(verdict, tolerancePercent)} Probability outside:{' '}
        {formatProbability(verdict.probabilityOutside)}.
      </p>
      <div className="bench-strip">
        <ToleranceStrip
          size="bench"
          {...verdictStrip(verdict, tolerancePercent, capitalise(what))}
          earlier={earlier}
        />
      </div>
    </div>
  );
}

/** As left at the last three visits, newest first: the wake of the strip. */
function useEarlierErrors(probeId: number, runId: number): number[] {
  const rows = useQuery(calibrationsBrief({ probeId, limit: 8 })).data?.items ?? [];
  return rows
    .filter((row) => row.id !== runId && row.asLeftErrorPercent !== null)
    .slice(0, 3)
    .map((row) => row.asLeftErrorPercent!);
}

import type { ReactNode } from 'react';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { LIMITS_OF_USE } from '../../../../../shared/format/cautions.ts';
import { formatDateTime, formatTime } from '../../../../../shared/format/dates.ts';
import {
  capitalise,
  DECISION_RULE_SENTENCES,
  OUTCOME_LABELS,
  PROBE_KIND_LABELS,
} from '../../../../../shared/format/labels.ts';
import { formatProbability } from '../../../../../shared/format/numbers.ts';
import { verdictSentence, verdictStrip } from '../../../../../shared/format/calibration-words.ts';
import { PageStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Crumbs } from '../../../components/ui/page-head.tsx';
import { useDocumentTitle } from '../../../lib/use-document-title.ts';
import { useHeadingFocus } from '../../../lib/use-heading-focus.ts';
import { paths } from '../../../paths.ts';
import { STATUS_LABELS } from '../words.ts';
import { BudgetBars } from './budget-bars.tsx';
import { ReferenceChain } from './reference-chain.tsx';
import { ReplicatesSection } from './replicates-section.tsx';
import { RunFacts } from './run-facts.tsx';
import { Signatures } from './signatures.tsx';
import { StepLog } from './step-log.tsx';
import { ThreeStates } from './three-states.tsx';

export interface RecordViewProps {
  run: Calibration;
  timeZone: string;
  /** What this person may do with it. */
  actions: ReactNode;
}

/** One calibration as it is kept: for every role, from the outcome down to each reading and signature. */
export function RecordView({ run, timeZone, actions }: RecordViewProps) {
  useDocumentTitle(`${run.number ?? 'Calibration'}, ${run.pointName}`);
  const heading = useHeadingFocus();
  const { judgement } = run;
  const last = judgement.asLeft ?? judgement.cleaned ?? judgement.asFound;
  return (
    <>
      <Crumbs
        items={[
          { label: 'Calibrations', to: paths.calibrations.to() },
          { label: run.probeTag, to: paths.probe.to({ id: run.probeId }) },
        ]}
      />
      <div className="run-head">
        <div>
          <h1 ref={heading} tabIndex={-1}>
            {run.pointName}
          </h1>
          <p className="probe-meta">
            {run.number ?? 'no number yet'} · {run.siteName}, point {run.pointCode} ·{' '}
            {PROBE_KIND_LABELS[run.probeKind]} probe, serial {run.probeSerial}
          </p>
          <p className="probe-meta">{whenWords(run, timeZone)}</p>
          <p className="probe-say">
            <b>{capitalise(STATUS_LABELS[run.status])}.</b> {statusSentence(run)}
          </p>
        </div>
        <div className="run-actions">{actions}</div>
      </div>
      {last ? (
        <div className="run-verdict">
          <PageStrip {...verdictStrip(last, run.tolerancePercent, lastName(run))} />
          <p>
            <b>{capitalise(OUTCOME_LABELS[last.outcome])}.</b> {lastName(run)}:{' '}
            {verdictSentence(last, run.tolerancePercent)} Rule: {DECISION_RULE_SENTENCES[run.decisionRule]}{' '}
            Probability outside the tolerance: {formatProbability(last.probabilityOutside)}.
          </p>
        </div>
      ) : null}
      <div className="run-columns">
        <div>
          <ThreeStates run={run} />
          <RunFacts run={run} timeZone={timeZone} />
          <ReplicatesSection run={run} timeZone={timeZone} />
          <StepLog run={run} timeZone={timeZone} />
        </div>
        <div>
          <ReferenceChain run={run} />
          {last ? <BudgetBars verdict={last} /> : null}
        </div>
      </div>
      <Signatures run={run} timeZone={timeZone} />
      <p className="ledger-foot">
        In-house calibration, traceable through the lot named above. {LIMITS_OF_USE}
      </p>
    </>
  );
}

function lastName({ judgement }: Calibration): string {
  if (judgement.asLeft) return 'As left';
  return judgement.cleaned ? 'As found, cleaned' : 'As found';
}

function whenWords(run: Calibration, timeZone: string): string {
  const ended = run.signedAt ? ` to ${formatTime(run.signedAt, { timeZone })}` : '';
  return `performed by ${run.performer}, ${formatDateTime(run.startedAt, { timeZone })}${ended}`;
}

function statusSentence(run: Calibration): string {
  switch (run.status) {
    case 'running':
      return `${run.performer} works on it at this moment.`;
    case 'stopped':
      return run.stoppedReason ?? '';
    case 'signed':
      return 'Another person reviews it.';
    case 'returned':
      return run.signatures.find((one) => one.meaning === 'returned')?.note ?? '';
    case 'amended':
      return run.amendedBy ? `${run.amendedBy.number} stands in its place.` : '';
    case 'approved':
      return run.amends ? `It amends ${run.amends.number}.` : '';
  }
}

import { useState } from 'react';
import { formatNumber, formatSigned } from '../../../../../shared/format/numbers.ts';
import { benchUnit, changeWords } from '../../../../../shared/format/calibration-words.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea } from '../../../components/ui/text-input.tsx';
import { capturesOf } from '../offline/run-state.ts';
import { useBench } from './bench-context.ts';
import { BenchFoot } from './bench-foot.tsx';
import { RefusedDeeds } from './refused-deeds.tsx';
import { Replicates } from './replicates.tsx';
import { VerdictPanel } from './verdict-panel.tsx';

type Decision = 'leave' | 'adjust';

/** The verdict on the cleaned probe, and whether anything is gained by adjusting. */
export function DecideScreen() {
  const { view, finish } = useBench();
  const [asking, setAsking] = useState<Decision | null>(null);
  const { judgement, procedure } = view.calibration;
  const { advice, cleaned, asFound, fouling, driftSinceAsLeft } = judgement;
  const step = procedureCleans(view.steps) ? 'as-found-cleaned' : 'as-found';
  const captures = capturesOf(view, step);
  const needsReason = (decision: Decision) =>
    decision === 'adjust' ? (advice?.needsReason ?? true) : advice?.decision === 'adjust';
  const decide = (decision: Decision) =>
    needsReason(decision) ? setAsking(decision) : finish({ step: 'decide', decision, reason: null });
  return (
    <>
      <div className="bench-columns">
        <div>
          <VerdictPanel
            verdict={cleaned ?? asFound}
            what={step === 'as-found' ? 'as found' : 'as found, cleaned'}
          />
          {advice ? (
            <p className="bench-say">
              <AdviceWords sentence={advice.sentence} />
            </p>
          ) : null}
          <dl className="verdict-figures">
            {fouling ? <Row term="Fouling, taken off by cleaning" value={changeWords(fouling)} /> : null}
            {driftSinceAsLeft ? (
              <Row term="Drift since last as left" value={changeWords(driftSinceAsLeft)} />
            ) : null}
            {advice && advice.decision !== 'replace' ? (
              <Row
                term="Cell constant, if adjusted"
                value={`${formatNumber(advice.proposedCellConstantPerCm, { significantDigits: 5 })} cm⁻¹ (${formatSigned(advice.changePercent, 2, '%')})`}
              />
            ) : null}
          </dl>
        </div>
        <div>
          <Replicates
            captures={captures}
            needed={procedure.criteria.minReplicates}
            unit={benchUnit(captures.map((one) => one.conductivityUsCm))}
            isOpen={false}
          />
          <RefusedDeeds />
        </div>
      </div>
      <BenchFoot>
        {advice ? (
          <div className="bench-two">
            <Button kind={advice.decision === 'adjust' ? 'plain' : 'primary'} onClick={() => decide('leave')}>
              Leave as it is
            </Button>
            {advice.decision === 'replace' ? null : (
              <Button
                kind={advice.decision === 'adjust' ? 'primary' : 'plain'}
                onClick={() => decide('adjust')}
              >
                {advice.needsReason ? 'Adjust, with reason' : 'Adjust'}
              </Button>
            )}
          </div>
        ) : (
          <Button kind="primary" disabled>
            Wait for the result
          </Button>
        )}
      </BenchFoot>
      {asking ? (
        <ReasonDialog
          decision={asking}
          onClose={() => setAsking(null)}
          onReason={(reason) => finish({ step: 'decide', decision: asking, reason })}
        />
      ) : null}
    </>
  );
}

const procedureCleans = (steps: readonly { step: string }[]): boolean =>
  steps.some((one) => one.step === 'as-found-cleaned');

function Row({ term, value }: { term: string; value: string }) {
  return (
    <>
      <dt>{term}</dt>
      <dd>{value}</dd>
    </>
  );
}

/** The advice opens with what to do; that much is said louder. */
function AdviceWords({ sentence }: { sentence: string }) {
  const at = sentence.indexOf(':');
  if (at < 0 || at > 40) return sentence;
  return (
    <>
      <b>{sentence.slice(0, at)}:</b>
      {sentence.slice(at + 1)}
    </>
  );
}

interface ReasonDialogProps {
  decision: Decision;
  onClose: () => void;
  onReason: (reason: string) => Promise<void>;
}

function ReasonDialog({ decision, onClose, onReason }: ReasonDialogProps) {
  const [reason, setReason] = useState('');
  const isEnough = reason.trim().length >= 3;
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={decision === 'adjust' ? 'Adjust, although' : 'Leave it, although'}
      sentence={
        decision === 'adjust'
          ? 'The record keeps why the cell constant is changed against the advice, or by this much.'
          : 'The advice is to adjust. The record keeps why the probe is left as it is.'
      }
      actions={
        <>
          <Button kind="primary" disabled={!isEnough} onClick={() => onReason(reason.trim())}>
            {decision === 'adjust' ? 'Adjust it' : 'Leave it as it is'}
          </Button>
          <Button onClick={onClose}>Back</Button>
        </>
      }
    >
      <Field label="Reason">
        <Textarea value={reason} maxLength={1000} onChange={(event) => setReason(event.target.value)} />
      </Field>
    </Dialog>
  );
}

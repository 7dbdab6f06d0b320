import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useChangeProbe } from '../api.ts';
import type { ProbeDraft } from './probe-fields.tsx';
import { contentOf, draftIssues, ProbeFields } from './probe-fields.tsx';

/** Correct what is recorded about a probe; old and new values stay in the audit trail. */
export function ChangeProbeDialog({ probe, onClose }: { probe: Probe; onClose: () => void }) {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState<ProbeDraft>(() => draftOf(probe));
  const [reason, setReason] = useState('');
  const change = useChangeProbe(probe.id);
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const { kind: _fixed, ...content } = contentOf(draft);
    const isDone = await submit(() => change.mutateAsync({ ...content, reason, version: probe.version }), {
      ...draftIssues(draft),
      ...(reason.trim() ? {} : { reason: 'Write the reason in a few words.' }),
    });
    if (!isDone) return;
    say(`What is recorded about ${probe.tag} is corrected.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      isWide
      onClose={onClose}
      isLocked={isPending}
      title={`Correct what is recorded about ${probe.tag}`}
      sentence="The cell constant in use is not changed here: a calibration does that."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Save
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
        <ProbeFields draft={draft} onChange={setDraft} issueFor={issueFor} hasKind={false} />
        <Field label="Reason" hint="Kept in the audit trail with your name." error={issueFor('reason')}>
          <Textarea
            rows={2}
            maxLength={1000}
            value={reason}
            onChange={(event) => setReason(event.target.value)}
          />
        </Field>
        {refusal ? (
          <p className="field-error" role="alert">
            {refusal}
          </p>
        ) : null}
      </form>
    </Dialog>
  );
}

function draftOf(probe: Probe): ProbeDraft {
  return {
    serial: probe.serial,
    tag: probe.tag,
    kind: probe.kind,
    nominalCellConstantPerCm: probe.nominalCellConstantPerCm,
    rangeLowUsCm: probe.rangeLowUsCm,
    rangeHighUsCm: probe.rangeHighUsCm,
    resolutionUsCm: probe.resolutionUsCm,
    temperatureSensor: probe.temperatureSensor,
    deviceCompensation: probe.deviceCompensation,
    notes: probe.notes ?? '',
  };
}

import { useQueryClient } from '@tanstack/react-query';
import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Instrument } from '../../../../../shared/contracts/instruments.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { changedFields, refetchOnConflict } from '../../../lib/refetch-on-conflict.ts';
import { useSubmission } from '../../../lib/use-submission.ts';
import { instrumentDetail, useChangeInstrument } from '../api.ts';
import { contentOf, draftOf, instrumentIssues } from '../model.ts';
import { InstrumentFields } from './instrument-fields.tsx';

/** A new certificate, a correction, a better name: only what was changed is sent, with a reason. */
export function ChangeInstrumentDialog({
  instrument,
  onClose,
}: {
  instrument: Instrument;
  onClose: () => void;
}) {
  const form = useRef<HTMLFormElement>(null);
  const [base] = useState(() => draftOf(instrument));
  const [draft, setDraft] = useState(base);
  const [reason, setReason] = useState('');
  const change = useChangeInstrument(instrument.id);
  const queryClient = useQueryClient();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const { kind: _, ...changes } = changedFields(contentOf(base), contentOf(draft));
    const body = { ...changes, reason, version: instrument.version };
    const issues = {
      ...instrumentIssues(draft),
      ...(reason.trim().length >= 3 ? {} : { reason: 'Write the reason in a few words.' }),
      ...(Object.keys(changes).length > 0 ? {} : { reason: 'Nothing was changed yet.' }),
    };
    const refetch = () =>
      queryClient.refetchQueries({ queryKey: instrumentDetail(instrument.id).queryKey, exact: true });
    const isDone = await submit(() => refetchOnConflict(() => change.mutateAsync(body), refetch), issues);
    if (!isDone) return;
    say(`${instrument.code} is changed.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      isWide
      onClose={onClose}
      isLocked={isPending}
      title={`Change ${instrument.code}`}
      sentence="Runs keep what the instrument was when they used it. Old and new values are kept with your reason."
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
        <InstrumentFields draft={draft} onChange={setDraft} issueFor={issueFor} isKindFixed />
        <Field label="Reason" hint="Kept in the audit trail with your name." error={issueFor('reason')}>
          <TextInput value={reason} maxLength={1000} onChange={(event) => setReason(event.target.value)} />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}

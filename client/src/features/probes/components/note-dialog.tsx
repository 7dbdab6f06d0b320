import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useAddNote } from '../api.ts';

/** A line in the probe's timeline; it cannot be changed later. */
export function NoteDialog({ probe, onClose }: { probe: Probe; onClose: () => void }) {
  const form = useRef<HTMLFormElement>(null);
  const [text, setText] = useState('');
  const add = useAddNote(probe.id);
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    if (await submit(() => add.mutateAsync(text))) onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Note on ${probe.tag}`}
      sentence="It stands in the timeline under your name and cannot be changed later."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Write note
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} onSubmit={(event) => void send(event)} noValidate>
        <Field label="Note" hint="Up to 120 characters." error={issueFor('text')}>
          <TextInput
            value={text}
            maxLength={120}
            autoFocus
            onChange={(event) => setText(event.target.value)}
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

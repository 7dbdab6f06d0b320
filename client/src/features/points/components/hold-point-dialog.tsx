import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { Button } from '../../../components/ui/button.tsx';
import { Caution } from '../../../components/ui/caution.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useHoldPoint } from '../hold-api.ts';
import type { HoldablePoint } from './hold-dialogs.tsx';

const SPANS = [
  { value: '30', label: 'in half an hour' },
  { value: '60', label: 'in an hour' },
  { value: '120', label: 'in two hours' },
  { value: '240', label: 'in four hours' },
  { value: '480', label: 'at the end of the shift, in eight hours' },
  { value: '1440', label: 'tomorrow, in 24 hours' },
] as const;

/** Say that one works on a point: its reading is then "do not use", quietly, with a name and a time. */
export function HoldPointDialog({ point, onClose }: { point: HoldablePoint; onClose: () => void }) {
  const form = useRef<HTMLFormElement>(null);
  const [reason, setReason] = useState('');
  const [minutes, setMinutes] = useState('60');
  const hold = useHoldPoint();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const untilAt = new Date(Date.now() + Number(minutes) * 60_000).toISOString();
    const isDone = await submit(() => hold.mutateAsync({ id: point.id, reason, untilAt }));
    if (!isDone) return;
    say(`You hold ${point.name}. Put it back when you are done.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Hold ${point.name}`}
      sentence="Its reading shows as do not use, with your name, until you put it back."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Hold this point
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      {point.controlNote ? (
        <Caution>
          <b>{point.controlNote}</b> Agree with the operators before you touch the probe.
        </Caution>
      ) : null}
      <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
        <Field
          label="What for"
          hint="In a few words, for everybody who sees the reading."
          error={issueFor('reason')}
        >
          <TextInput
            value={reason}
            placeholder="cleaning, checking, a leaking fitting"
            maxLength={200}
            autoFocus
            onChange={(event) => setReason(event.target.value)}
          />
        </Field>
        <Field label="Back about" error={issueFor('untilAt')}>
          <Select options={SPANS} value={minutes} onChange={(event) => setMinutes(event.target.value)} />
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

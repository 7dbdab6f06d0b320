import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCalibrationDeed } from '../api.ts';

export interface AmendDialogProps {
  run: Calibration;
  userId: number;
  onClose: () => void;
}

/** Nothing signed changes: a correction is a record of its own that names this one. */
export function AmendDialog({ run, userId, onClose }: AmendDialogProps) {
  const amend = useCalibrationDeed(run.id, 'amend', userId);
  const navigate = useNavigate();
  const [draft, setDraft] = useState({ aspect: '', text: '', reason: '', password: '' });
  const { isPending, refusal, issueFor, submit } = useSubmission();
  const write = (name: keyof typeof draft) => (event: { target: { value: string } }) =>
    setDraft({ ...draft, [name]: event.target.value });
  const press = async () => {
    let amendment: Calibration | null = null;
    const isDone = await submit(async () => {
      amendment = await amend.mutateAsync(draft);
    });
    if (!isDone) return;
    onClose();
    const to = (amendment as Calibration | null)?.id;
    if (to !== undefined) void navigate(paths.calibration.to({ id: to }));
  };
  return (
    <Dialog
      isOpen
      isWide
      isLocked={isPending}
      onClose={onClose}
      title={`Amend ${run.number ?? ''}`}
      sentence="The signed record stays as it is. The amendment gets a number of its own and refers to it."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={press}>
            Write and sign the amendment
          </Button>
          <Button onClick={onClose}>Back</Button>
        </>
      }
    >
      <Field label="What it concerns" error={issueFor('aspect')} hint="Permit number, name of the agent, …">
        <TextInput value={draft.aspect} maxLength={120} onChange={write('aspect')} />
      </Field>
      <Field label="What is right" error={issueFor('text')}>
        <Textarea value={draft.text} maxLength={4000} onChange={write('text')} />
      </Field>
      <Field label="Reason" error={issueFor('reason')}>
        <Textarea value={draft.reason} maxLength={1000} rows={2} onChange={write('reason')} />
      </Field>
      <Field label="Your password, again" error={issueFor('password')}>
        <TextInput
          type="password"
          autoComplete="current-password"
          value={draft.password}
          onChange={write('password')}
        />
      </Field>
      <FormRefusal>{refusal}</FormRefusal>
    </Dialog>
  );
}

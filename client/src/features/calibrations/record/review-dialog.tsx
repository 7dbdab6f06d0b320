import { useState } from 'react';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useCalibrationDeed } from '../api.ts';

export interface ReviewDialogProps {
  run: Calibration;
  userId: number;
  decision: 'approve' | 'return';
  onClose: () => void;
}

/** The second pair of eyes signs as well: approved for use, or returned with what has to be done. */
export function ReviewDialog({ run, userId, decision, onClose }: ReviewDialogProps) {
  const review = useCalibrationDeed(run.id, 'review', userId);
  const [password, setPassword] = useState('');
  const [reason, setReason] = useState('');
  const { isPending, refusal, issueFor, submit } = useSubmission();
  const isReturn = decision === 'return';
  const press = async () => {
    const body = { decision, reason: reason.trim() || null, password };
    const isDone = await submit(() => review.mutateAsync(body), {
      reason: isReturn && reason.trim().length < 3 ? 'Say what has to be done.' : undefined,
      password: password ? undefined : 'Your password signs it.',
    });
    if (isDone) onClose();
  };
  return (
    <Dialog
      isOpen
      isLocked={isPending}
      onClose={onClose}
      title={isReturn ? `Return ${run.number ?? 'this run'}` : `Approve ${run.number ?? 'this run'}`}
      sentence={
        isReturn
          ? `${run.performer} reads your reason and calibrates anew. Nothing captured is lost.`
          : '“Reviewed and approved for use.” Your name, the time and this sentence stand on the record.'
      }
      actions={
        <>
          <Button kind={isReturn ? 'danger' : 'primary'} isPending={isPending} onClick={press}>
            {isReturn ? 'Return it' : 'Approve and sign'}
          </Button>
          <Button onClick={onClose}>Back</Button>
        </>
      }
    >
      {isReturn ? (
        <Field label="What has to be done" error={issueFor('reason')}>
          <Textarea value={reason} maxLength={1000} onChange={(event) => setReason(event.target.value)} />
        </Field>
      ) : null}
      <Field label="Your password, again" error={issueFor('password')}>
        <TextInput
          type="password"
          autoComplete="current-password"
          value={password}
          onChange={(event) => setPassword(event.target.value)}
        />
      </Field>
      <FormRefusal>{refusal}</FormRefusal>
    </Dialog>
  );
}

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { Textarea } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { colleagues, useCalibrationDeed } from '../api.ts';

export interface HandOverDialogProps {
  run: Calibration;
  userId: number;
  onClose: () => void;
}

/** A run changes hands on record: who took it from whom, and why. */
export function HandOverDialog({ run, userId, onClose }: HandOverDialogProps) {
  const query = useQuery(colleagues());
  const handOver = useCalibrationDeed(run.id, 'hand-over', userId);
  const [toUserId, setToUserId] = useState('');
  const [reason, setReason] = useState('');
  const { isPending, refusal, issueFor, submit } = useSubmission();
  const press = async () => {
    const isDone = await submit(
      () => handOver.mutateAsync({ toUserId: Number(toUserId), reason: reason.trim() }),
      {
        toUserId: toUserId ? undefined : 'Choose who goes on.',
        reason: reason.trim().length < 3 ? 'Say why in a few words.' : undefined,
      },
    );
    if (isDone) onClose();
  };
  return (
    <Dialog
      isOpen
      isLocked={isPending}
      onClose={onClose}
      title="Hand this run over"
      sentence="What is captured stays under the name of the person who captured it. From here on the other person works and signs."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={press}>
            Hand it over
          </Button>
          <Button onClick={onClose}>Back</Button>
        </>
      }
    >
      <Answer query={query} what="the people">
        {({ items }) => (
          <Field label="Who goes on" error={issueFor('toUserId')}>
            <Select
              placeholder="choose a person"
              value={toUserId}
              onChange={(event) => setToUserId(event.target.value)}
              options={items
                .filter((person) => person.id !== run.performerId)
                .map((person) => ({ value: String(person.id), label: person.name }))}
            />
          </Field>
        )}
      </Answer>
      <Field label="Reason" error={issueFor('reason')}>
        <Textarea
          value={reason}
          maxLength={1000}
          rows={2}
          onChange={(event) => setReason(event.target.value)}
        />
      </Field>
      <FormRefusal>{refusal}</FormRefusal>
    </Dialog>
  );
}

import { useQueryClient } from '@tanstack/react-query';
import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { ChangePoint, Point } from '../../../../../shared/contracts/points.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { Textarea } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { changedFields, refetchOnConflict } from '../../../lib/refetch-on-conflict.ts';
import { useSubmission } from '../../../lib/use-submission.ts';
import { pointDetail, useChangePoint } from '../api.ts';
import { contentOfDraft, draftOfPoint, pointIssues } from '../draft.ts';
import { PurposeFields, RequirementFields, ValueFields } from './point-fields.tsx';

export interface ChangePointDialogProps {
  point: Point;
  /** Areas of the point's site. */
  areas: readonly { id: number; name: string }[];
  onClose: () => void;
}

/** Change what a point asks for, with a reason; only what was changed is sent. */
export function ChangePointDialog({ point, areas, onClose }: ChangePointDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [base] = useState(() => draftOfPoint(point));
  const [draft, setDraft] = useState(base);
  const [reason, setReason] = useState('');
  const change = useChangePoint(point.id);
  const queryClient = useQueryClient();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const changes = changedFields(contentOfDraft(base), contentOfDraft(draft));
    const body: ChangePoint = { ...changes, reason, version: point.version };
    const refetch = () =>
      queryClient.refetchQueries({ queryKey: pointDetail(point.id).queryKey, exact: true });
    const issues = {
      ...pointIssues(draft),
      ...(reason.trim().length >= 3 ? {} : { reason: 'Write the reason in a few words.' }),
      ...(Object.keys(changes).length > 0 ? {} : { reason: 'Nothing was changed yet.' }),
    };
    const isDone = await submit(() => refetchOnConflict(() => change.mutateAsync(body), refetch), issues);
    if (!isDone) return;
    say(`What ${point.name} asks for is changed.`);
    onClose();
  };
  const fields = { draft, onChange: setDraft, issueFor };
  return (
    <Dialog
      isOpen
      isWide
      onClose={onClose}
      isLocked={isPending}
      title={`Change ${point.name}`}
      sentence="Readings are judged by the new requirements from then on. Old and new values are kept with your reason."
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
        <RequirementFields {...fields} />
        <ValueFields {...fields} />
        <PurposeFields {...fields} />
        <Field label="Area" error={issueFor('areaId')}>
          <Select
            value={String(draft.areaId)}
            options={areas.map((area) => ({ value: String(area.id), label: area.name }))}
            onChange={(event) => setDraft({ ...draft, areaId: Number(event.target.value) })}
          />
        </Field>
        <Field label="Reason" hint="Kept in the audit trail with your name." error={issueFor('reason')}>
          <Textarea
            rows={2}
            maxLength={1000}
            value={reason}
            onChange={(event) => setReason(event.target.value)}
          />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}

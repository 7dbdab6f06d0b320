import { useQueryClient } from '@tanstack/react-query';
import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Site } from '../../../../../shared/contracts/sites.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { changedFields, refetchOnConflict } from '../../../lib/refetch-on-conflict.ts';
import { useSubmission } from '../../../lib/use-submission.ts';
import { siteDetail, useChangeSite } from '../api.ts';
import { TimeZoneInput } from './time-zone-input.tsx';

export function ChangeSiteDialog({ site, onClose }: { site: Site; onClose: () => void }) {
  const form = useRef<HTMLFormElement>(null);
  const [base] = useState({ name: site.name, timeZone: site.timeZone });
  const [draft, setDraft] = useState(base);
  const [reason, setReason] = useState('');
  const change = useChangeSite(site.id);
  const queryClient = useQueryClient();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const body = { ...changedFields(base, draft), reason, version: site.version };
    const refetch = () => queryClient.refetchQueries({ queryKey: siteDetail(site.id).queryKey });
    const isDone = await submit(
      () => refetchOnConflict(() => change.mutateAsync(body), refetch),
      reason.trim().length >= 3 ? {} : { reason: 'Write the reason in a few words.' },
    );
    if (!isDone) return;
    say(`${draft.name} is changed.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Change ${site.name}`}
      sentence="Stored times do not change with the time zone: only how they are shown."
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
        <Field label="Name" error={issueFor('name')}>
          <TextInput
            value={draft.name}
            maxLength={120}
            onChange={(event) => setDraft({ ...draft, name: event.target.value })}
          />
        </Field>
        <Field label="Time zone" error={issueFor('timeZone')}>
          <TimeZoneInput value={draft.timeZone} onChange={(timeZone) => setDraft({ ...draft, timeZone })} />
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

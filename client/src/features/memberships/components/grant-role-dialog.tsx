import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Role } from '../../../../../shared/contracts/vocabulary.ts';
import { roles } from '../../../../../shared/contracts/vocabulary.ts';
import { capitalise, ROLE_LABELS, ROLE_TASKS } from '../../../../../shared/format/labels.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { RadioGroup } from '../../../components/ui/radio-group.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useGrantRole } from '../api.ts';

export interface GrantRoleDialogProps {
  user: { id: number; name: string };
  sites: readonly { id: number; name: string }[];
  onClose: () => void;
}

const EVERYWHERE = 'all';

/** A role at one site or at all; an auditor's always with its last day. */
export function GrantRoleDialog({ user, sites, onClose }: GrantRoleDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState({ role: null as Role | null, where: '', endsOn: '', reason: '' });
  const grant = useGrantRole();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const needsEnd = draft.role === 'auditor';
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const issues = {
      ...(draft.role ? {} : { role: 'Choose what the person comes to do.' }),
      ...(draft.where ? {} : { siteId: 'Choose where.' }),
      ...(needsEnd && !draft.endsOn ? { endsOn: 'An auditor’s role needs the day it ends.' } : {}),
      ...(draft.reason.trim().length >= 3 ? {} : { reason: 'Write the reason in a few words.' }),
    };
    const write = () =>
      grant.mutateAsync({
        userId: user.id,
        siteId: draft.where === EVERYWHERE ? null : Number(draft.where),
        role: draft.role ?? 'operator',
        endsOn: draft.endsOn || null,
        reason: draft.reason,
      });
    if (!(await submit(write, issues))) return;
    say(`${user.name} is now ${ROLE_LABELS[draft.role ?? 'operator']}.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Give ${user.name} a role`}
      sentence="It counts at once. One role per site: end the other first if there is one."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Give role
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
        <RadioGroup
          legend="Role"
          error={issueFor('role')}
          options={roles.map((role) => ({
            value: role,
            label: capitalise(ROLE_LABELS[role]),
            hint: ROLE_TASKS[role],
          }))}
          value={draft.role}
          onChange={(role) => setDraft({ ...draft, role: role as Role })}
        />
        <Field label="Where" error={issueFor('siteId')}>
          <Select
            placeholder="choose where"
            value={draft.where}
            options={[
              { value: EVERYWHERE, label: 'all sites' },
              ...sites.map((site) => ({ value: String(site.id), label: site.name })),
            ]}
            onChange={(event) => setDraft({ ...draft, where: event.target.value })}
          />
        </Field>
        <Field
          label="Last day"
          isOptional={!needsEnd}
          hint={needsEnd ? 'Access ends at the end of this day (UTC).' : 'Leave empty to end it by hand.'}
          error={issueFor('endsOn')}
        >
          <TextInput
            type="date"
            value={draft.endsOn}
            onChange={(event) => setDraft({ ...draft, endsOn: event.target.value })}
          />
        </Field>
        <Field label="Reason" hint="Kept in the audit trail with your name." error={issueFor('reason')}>
          <Textarea
            rows={2}
            maxLength={1000}
            value={draft.reason}
            onChange={(event) => setDraft({ ...draft, reason: event.target.value })}
          />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}

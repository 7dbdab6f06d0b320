import { useQueryClient } from '@tanstack/react-query';
import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Setting } from '../../../../../shared/contracts/settings.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { changedFields, refetchOnConflict } from '../../../lib/refetch-on-conflict.ts';
import { useSubmission } from '../../../lib/use-submission.ts';
import { settingsList, useChangeSetting } from '../api.ts';
import type { SettingDraft, SettingField, SettingGroup } from '../model.ts';
import { draftIssues, draftOf } from '../model.ts';

export interface ChangeSettingDialogProps {
  group: SettingGroup;
  setting: Setting;
  onClose: () => void;
}

export function ChangeSettingDialog({ group, setting, onClose }: ChangeSettingDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [base] = useState(() => draftOf(group, setting));
  const [draft, setDraft] = useState<SettingDraft>(base);
  const [reason, setReason] = useState('');
  const change = useChangeSetting(group.key);
  const queryClient = useQueryClient();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    // On top of what is stored now, only what was changed here.
    const value = { ...draftOf(group, setting), ...changedFields(base, draft) };
    const issues = {
      ...draftIssues(group, draft),
      ...(reason.trim().length >= 3 ? {} : { reason: 'Write the reason in a few words.' }),
    };
    const write = () => change.mutateAsync({ value, reason, version: setting.version });
    const refetch = () => queryClient.refetchQueries({ queryKey: settingsList().queryKey });
    if (!(await submit(() => refetchOnConflict(write, refetch), issues))) return;
    say(`“${group.title}” is changed and counts from now on.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={group.title}
      sentence="Counts at every site from now on. Old and new values are kept with your reason."
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
        {group.fields.map((field) => (
          <Field
            key={field.name}
            label={field.label}
            hint={field.hint}
            error={issueFor(`value.${field.name}`)}
          >
            <ValueInput
              field={field}
              value={draft[field.name] ?? null}
              onChange={(value) => setDraft({ ...draft, [field.name]: value })}
            />
          </Field>
        ))}
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

interface ValueInputProps {
  field: SettingField;
  value: string | number | null;
  onChange: (value: string | number | null) => void;
}

function ValueInput({ field, value, onChange }: ValueInputProps) {
  if (field.unit === undefined)
    return (
      <TextInput value={value ?? ''} maxLength={120} onChange={(event) => onChange(event.target.value)} />
    );
  return (
    <NumberInput unit={field.unit} value={typeof value === 'number' ? value : null} onChange={onChange} />
  );
}

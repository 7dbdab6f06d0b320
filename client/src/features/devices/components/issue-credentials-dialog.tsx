import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { IssuedCredentials } from '../../../../../shared/contracts/devices.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useIssueCredentials } from '../api.ts';

export interface IssueCredentialsDialogProps {
  probe: { id: number; tag: string };
  onClose: () => void;
  onIssued: (issued: IssuedCredentials) => void;
}

export function IssueCredentialsDialog({ probe, onClose, onIssued }: IssueCredentialsDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [name, setName] = useState(probe.tag);
  const issue = useIssueCredentials();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const isDone = await submit(async () => onIssued(await issue.mutateAsync({ probeId: probe.id, name })));
    if (isDone) onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Issue credentials for ${probe.tag}`}
      sentence="A device signs in with its name and a password of its own, and may speak only for this probe. The password is shown once, next."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Issue credentials
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} onSubmit={(event) => void send(event)} noValidate>
        <Field
          label="Device name"
          hint="It is also its user name and part of its topics. It cannot be changed later."
          error={issueFor('name')}
        >
          <TextInput
            value={name}
            autoCapitalize="none"
            spellCheck={false}
            autoFocus
            onChange={(event) => setName(event.target.value)}
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

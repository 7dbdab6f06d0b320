import { useQueryClient } from '@tanstack/react-query';
import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { User } from '../../../../../shared/contracts/users.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { changedFields, refetchOnConflict } from '../../../lib/refetch-on-conflict.ts';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useChangeUser, userDetail } from '../api.ts';
import { personIssues, PersonFields } from './person-fields.tsx';

export function ChangePersonDialog({ user, onClose }: { user: User; onClose: () => void }) {
  const form = useRef<HTMLFormElement>(null);
  const [base] = useState({ name: user.name, email: user.email });
  const [draft, setDraft] = useState(base);
  const change = useChangeUser(user.id);
  const queryClient = useQueryClient();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const body = { ...changedFields(base, draft), version: user.version };
    const refetch = () => queryClient.refetchQueries({ queryKey: userDetail(user.id).queryKey });
    const isDone = await submit(
      () => refetchOnConflict(() => change.mutateAsync(body), refetch),
      personIssues(draft),
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
      title={`Change ${user.name}`}
      sentence="What was signed under the old name keeps it; the audit trail has both."
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
        <PersonFields draft={draft} onChange={setDraft} issueFor={issueFor} />
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}

import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Area } from '../../../../../shared/contracts/sites.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useAddArea, useRenameArea } from '../api.ts';

/** One field under the areas: the next area. */
export function AddAreaForm({ siteId }: { siteId: number }) {
  const form = useRef<HTMLFormElement>(null);
  const [name, setName] = useState('');
  const add = useAddArea(siteId);
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const issues = name.trim() ? {} : { name: 'Write the name of the area.' };
    if (!(await submit(() => add.mutateAsync(name), issues))) return;
    say(`The area ${name} is added.`);
    setName('');
  };
  return (
    <form ref={form} className="form mt-5 max-w-90" onSubmit={(event) => void send(event)} noValidate>
      <Field label="One more area" error={issueFor('name')}>
        <TextInput value={name} maxLength={120} onChange={(event) => setName(event.target.value)} />
      </Field>
      <FormRefusal>{refusal}</FormRefusal>
      <div className="form-actions">
        <Button type="submit" isPending={isPending}>
          Add area
        </Button>
      </div>
    </form>
  );
}

export function RenameAreaDialog({ area, onClose }: { area: Area; onClose: () => void }) {
  const [name, setName] = useState(area.name);
  const rename = useRenameArea(area.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Rename ${area.name}`}
      sentence="Points keep their codes and their history; only the name of the area changes."
      confirmLabel="Rename area"
      asksReason
      onConfirm={async (reason) => {
        await rename.mutateAsync({ name, reason });
        say(`${area.name} is now called ${name}.`);
      }}
    >
      <Field label="New name">
        <TextInput value={name} maxLength={120} onChange={(event) => setName(event.target.value)} />
      </Field>
    </ConfirmDialog>
  );
}

import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCreateUser } from '../api.ts';
import { personIssues, PersonFields } from './person-fields.tsx';

/** A person; a link to set the password goes out by mail, and roles are given on the person's page. */
export function NewPersonForm() {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState({ name: '', email: '' });
  const create = useCreateUser();
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const isDone = await submit(async () => {
      const user = await create.mutateAsync(draft);
      await navigate(paths.person.to({ id: user.id }));
    }, personIssues(draft));
    if (isDone) say(`${draft.name} is added and a link is on its way by mail. Give a role next.`);
  };
  return (
    <>
      <PageHead
        name="Add a person"
        sentence="The person gets a link by mail to set a password. Without a role nobody can sign in: give one on the next page."
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <PersonFields draft={draft} onChange={setDraft} issueFor={issueFor} />
        <FormRefusal>{refusal}</FormRefusal>
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Add person
          </Button>
          <ButtonLink to={paths.people.to()}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCreateSite } from '../api.ts';
import { TimeZoneInput } from './time-zone-input.tsx';

/** A site; its areas and points come next, on its own page. */
export function NewSiteForm() {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState({ name: '', code: '', timeZone: '' });
  const create = useCreateSite();
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const isDone = await submit(
      async () => {
        const site = await create.mutateAsync(draft);
        await navigate(paths.site.to({ id: site.id }));
      },
      {
        ...(draft.name.trim() ? {} : { name: 'Write the name of the site.' }),
        ...(draft.code.trim() ? {} : { code: 'Write a short code of 2 to 8 letters and digits.' }),
        ...(draft.timeZone.trim() ? {} : { timeZone: 'Choose the time zone of the site.' }),
      },
    );
    if (isDone) say(`${draft.name} is added. Add its areas next.`);
  };
  return (
    <>
      <PageHead
        name="Add a site"
        sentence="A place with its own people, areas and time zone. Rights are given per site."
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <Field label="Name" error={issueFor('name')}>
          <TextInput
            value={draft.name}
            maxLength={120}
            onChange={(event) => setDraft({ ...draft, name: event.target.value })}
          />
        </Field>
        <div className="form-pair">
          <Field
            label="Code"
            hint="2 to 8 letters and digits; it stands in topics of devices and stays."
            error={issueFor('code')}
          >
            <TextInput
              value={draft.code}
              maxLength={8}
              autoCapitalize="characters"
              onChange={(event) => setDraft({ ...draft, code: event.target.value })}
            />
          </Field>
          <Field label="Time zone" hint="Times of this site are shown in it." error={issueFor('timeZone')}>
            <TimeZoneInput value={draft.timeZone} onChange={(timeZone) => setDraft({ ...draft, timeZone })} />
          </Field>
        </div>
        <FormRefusal>{refusal}</FormRefusal>
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Add site
          </Button>
          <ButtonLink to={paths.sites.to()}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

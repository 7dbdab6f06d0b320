import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Crumbs, PageHead } from '../../../components/ui/page-head.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCreateInstrument } from '../api.ts';
import { contentOf, EMPTY_INSTRUMENT, instrumentIssues } from '../model.ts';
import { InstrumentFields } from './instrument-fields.tsx';

export function NewInstrumentForm() {
  const form = useRef<HTMLFormElement>(null);
  const [code, setCode] = useState('');
  const [draft, setDraft] = useState(EMPTY_INSTRUMENT);
  const create = useCreateInstrument();
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const missingCode = code.trim() ? {} : { code: 'Write the code that stands on its tag.' };
    const isDone = await submit(
      async () => {
        const made = await create.mutateAsync({ ...contentOf(draft), code });
        await navigate(paths.instrument.to({ id: made.id }));
      },
      { ...missingCode, ...instrumentIssues(draft) },
    );
    if (isDone) say(`${code.toUpperCase()} is registered. Attach its certificate next.`);
  };
  return (
    <>
      <Crumbs items={[{ label: 'Reference instruments', to: paths.instruments.to() }]} />
      <PageHead
        name="Register an instrument"
        sentence="What a run’s temperatures, masses and resistances rest on, as its certificate states it."
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <Field label="Code" hint="As on its tag: letters, digits, hyphens." error={issueFor('code')}>
          <TextInput value={code} maxLength={24} onChange={(event) => setCode(event.target.value)} />
        </Field>
        <InstrumentFields draft={draft} onChange={setDraft} issueFor={issueFor} />
        <FormRefusal>{refusal}</FormRefusal>
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Register instrument
          </Button>
          <ButtonLink to={paths.instruments.to()}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

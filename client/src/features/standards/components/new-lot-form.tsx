import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Crumbs, PageHead } from '../../../components/ui/page-head.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCreateStandard } from '../api.ts';
import { contentOfLot, EMPTY_LOT, lotIssues } from '../draft.ts';
import { BottleFields, CertificateFields, SolutionFields } from './lot-fields.tsx';

/** Register a lot from its certificate; it is in quarantine until somebody has checked it and releases it. */
export function NewLotForm() {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState(EMPTY_LOT);
  const create = useCreateStandard();
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const isDone = await submit(async () => {
      const lot = await create.mutateAsync(contentOfLot(draft));
      await navigate(paths.standard.to({ id: lot.id }));
    }, lotIssues(draft));
    if (isDone)
      say(`${draft.code.toUpperCase()} is registered and in quarantine. Release it when it is checked.`);
  };
  const fields = { draft, onChange: setDraft, issueFor };
  return (
    <>
      <Crumbs items={[{ label: 'Reference solutions', to: paths.standards.to() }]} />
      <PageHead
        name="Register a lot"
        sentence="Copy what the bottle and its certificate say. The lot is in quarantine until it is released."
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <BottleFields {...fields} />
        <SolutionFields {...fields} />
        <CertificateFields {...fields} />
        <FormRefusal>{refusal}</FormRefusal>
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Register lot
          </Button>
          <ButtonLink to={paths.standards.to()}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useRegisterProbe } from '../api.ts';
import type { ProbeDraft } from './probe-fields.tsx';
import { contentOf, draftIssues, ProbeFields } from './probe-fields.tsx';

const EMPTY: ProbeDraft = {
  serial: '',
  tag: '',
  kind: 'two-electrode',
  nominalCellConstantPerCm: null,
  rangeLowUsCm: 0,
  rangeHighUsCm: null,
  resolutionUsCm: null,
  temperatureSensor: 'pt1000',
  deviceCompensation: 'none',
  notes: '',
};

export interface RegisterProbeFormProps {
  /** Sites where this person may register probes. */
  sites: readonly { id: number; name: string }[];
  siteId: number | null;
}

/** Register a probe as its nameplate states it; installing and connecting it are the next steps, on its own page. */
export function RegisterProbeForm({ sites, siteId }: RegisterProbeFormProps) {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState(EMPTY);
  const [chosen, setChosen] = useState<number | null>(null);
  const site = chosen ?? siteId ?? (sites.length === 1 ? sites[0]!.id : null);
  const register = useRegisterProbe();
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const issues = { ...draftIssues(draft), ...(site === null ? { siteId: 'Choose the site.' } : {}) };
    const isDone = await submit(async () => {
      const probe = await register.mutateAsync({ ...contentOf(draft), siteId: site ?? 0 });
      await navigate(paths.probe.to({ id: probe.id }));
    }, issues);
    if (isDone) say(`${draft.tag} is registered. Install it and issue its credentials here.`);
  };
  return (
    <>
      <PageHead
        name="Register a probe"
        sentence="Copy what the nameplate says. Where it stands and what its reading must meet belong to the measuring point."
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <Field label="Kept at" hint="Rights to this probe follow its site." error={issueFor('siteId')}>
          <Select
            placeholder="choose a site"
            value={site === null ? '' : String(site)}
            options={sites.map((one) => ({ value: String(one.id), label: one.name }))}
            onChange={(event) => setChosen(Number(event.target.value) || null)}
          />
        </Field>
        <ProbeFields draft={draft} onChange={setDraft} issueFor={issueFor} hasKind />
        {refusal ? (
          <p className="field-error" role="alert">
            {refusal}
          </p>
        ) : null}
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Register probe
          </Button>
          <ButtonLink to={paths.probes.to()}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

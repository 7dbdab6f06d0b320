import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCreatePoint } from '../api.ts';
import { contentOfDraft, EMPTY_DRAFT, pointIssues } from '../draft.ts';
import { PurposeFields, RequirementFields, ValueFields } from './point-fields.tsx';

export interface NewPointFormProps {
  /** Areas of the sites where this person may add points. */
  areas: readonly { id: number; name: string; siteName: string }[];
  areaId: number | null;
}

/** A measuring point with its requirements; a probe is installed there afterwards. */
export function NewPointForm({ areas, areaId }: NewPointFormProps) {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState({ ...EMPTY_DRAFT, areaId });
  const [code, setCode] = useState('');
  const create = useCreatePoint();
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const missingCode = code.trim() ? {} : { code: 'Write the code that stands on the drawing.' };
    const isDone = await submit(
      async () => {
        const point = await create.mutateAsync({ ...contentOfDraft(draft), code });
        await navigate(paths.point.to({ id: point.id }));
      },
      { ...missingCode, ...pointIssues(draft) },
    );
    if (isDone) say(`${draft.name} is added. Install a probe there next.`);
  };
  const fields = { draft, onChange: setDraft, issueFor };
  return (
    <>
      <PageHead
        name="Add a point"
        sentence="Requirements belong to the measuring point: what its reading decides, and how far it may be off."
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <div className="form-pair">
          <Field label="Area" error={issueFor('areaId')}>
            <Select
              placeholder="choose an area"
              value={draft.areaId === null ? '' : String(draft.areaId)}
              options={areas.map((area) => ({
                value: String(area.id),
                label: `${area.siteName} · ${area.name}`,
              }))}
              onChange={(event) => setDraft({ ...draft, areaId: Number(event.target.value) || null })}
            />
          </Field>
          <Field label="Code" hint="Letters, digits and hyphens; fixed from now on." error={issueFor('code')}>
            <TextInput value={code} maxLength={24} onChange={(event) => setCode(event.target.value)} />
          </Field>
        </div>
        <PurposeFields {...fields} />
        <SectionTitle>What a reading there must satisfy</SectionTitle>
        <RequirementFields {...fields} />
        <SectionTitle note="limits are those of the process, at the reference temperature">
          How its value is stated
        </SectionTitle>
        <ValueFields {...fields} />
        <FormRefusal>{refusal}</FormRefusal>
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Add point
          </Button>
          <ButtonLink to={paths.points.to()}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

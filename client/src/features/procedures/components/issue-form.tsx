import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import {
  indispensableSteps,
  stepsIssue,
  type Criteria,
  type Procedure,
} from '../../../../../shared/contracts/procedures.ts';
import { probeKinds, runSteps, type RunStep } from '../../../../../shared/contracts/vocabulary.ts';
import { capitalise, PROBE_KIND_LABELS } from '../../../../../shared/format/labels.ts';
import { CRITERIA_LABELS, PROCEDURE_STEPS } from '../../../../../shared/format/reference-labels.ts';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Checkbox } from '../../../components/ui/checkbox.tsx';
import { Field, FieldGroup } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useIssueProcedure } from '../api.ts';

const criteriaKeys = Object.keys(CRITERIA_LABELS) as (keyof Criteria)[];
type CriteriaDraft = Record<keyof Criteria, number | null>;

/** The steps of the base version in its own order; what is taken in anew stands where the list of steps has it. */
function inOrder(base: readonly RunStep[], chosen: ReadonlySet<RunStep>): RunStep[] {
  const rank = (step: RunStep) => {
    const at = base.indexOf(step);
    if (at >= 0) return at;
    const before = runSteps.slice(0, runSteps.indexOf(step)).filter((one) => base.includes(one));
    return base.indexOf(before.at(-1)!) + 0.5;
  };
  return runSteps.filter((step) => chosen.has(step)).sort((a, b) => rank(a) - rank(b));
}

/** The next version of a procedure: which steps, and the numbers a run is held to. */
export function IssueForm({ procedure }: { procedure: Procedure }) {
  const form = useRef<HTMLFormElement>(null);
  const [name, setName] = useState(procedure.name);
  const [kinds, setKinds] = useState(new Set(procedure.probeKinds));
  const [chosen, setChosen] = useState<ReadonlySet<RunStep>>(new Set(procedure.steps));
  const [criteria, setCriteria] = useState<CriteriaDraft>(procedure.criteria);
  const [reason, setReason] = useState('');
  const issue = useIssueProcedure(procedure.code);
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const steps = inOrder(procedure.steps, chosen);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const found = {
      steps: stepsIssue(steps) ?? undefined,
      reason: reason.trim().length < 3 ? 'Write what changed and why, in a few words.' : undefined,
      probeKinds: kinds.size === 0 ? 'Choose at least one kind of probe.' : undefined,
    };
    const isDone = await submit(async () => {
      const issued = await issue.mutateAsync({
        name,
        probeKinds: probeKinds.filter((kind) => kinds.has(kind)),
        steps,
        criteria: criteria as Criteria,
        basedOnVersion: procedure.version,
        reason,
      });
      await navigate(paths.procedure.to({ id: issued.id }));
    }, found);
    if (isDone) say(`Version ${procedure.version + 1} is in force. Running calibrations keep theirs.`);
  };
  return (
    <>
      <Crumbs
        items={[
          { label: 'Procedures', to: paths.procedures.to() },
          { label: procedure.name, to: paths.procedure.to({ id: procedure.id }) },
        ]}
      />
      <PageHead
        name="Issue a new version"
        sentence={`It replaces version ${procedure.version} for runs that begin from then on. Earlier records keep the version they were made with.`}
      />
      <form ref={form} className="form form-page" onSubmit={(event) => void send(event)} noValidate>
        <Field label="Name" error={issueFor('name')}>
          <TextInput value={name} maxLength={120} onChange={(event) => setName(event.target.value)} />
        </Field>
        <FieldGroup legend="For probes" error={issueFor('probeKinds')}>
          <div className="choices">
            {probeKinds.map((kind) => (
              <Checkbox
                key={kind}
                label={capitalise(PROBE_KIND_LABELS[kind])}
                isChecked={kinds.has(kind)}
                onChange={(isChecked) => setKinds(toggled(kinds, kind, isChecked))}
              />
            ))}
          </div>
        </FieldGroup>
        <FieldGroup
          legend="Steps"
          hint="The order is fixed, as found always before cleaning and adjusting. A step that is left out is absent from the run, not skipped by hand."
          error={issueFor('steps') ?? (stepsIssue(steps) || undefined)}
        >
          <ol>
            {inOrder(procedure.steps, new Set(runSteps)).map((step) => (
              <li key={step}>
                <Checkbox
                  label={PROCEDURE_STEPS[step].label}
                  hint={
                    (indispensableSteps as readonly RunStep[]).includes(step)
                      ? `${PROCEDURE_STEPS[step].purpose}; in every run`
                      : PROCEDURE_STEPS[step].purpose
                  }
                  isDisabled={(indispensableSteps as readonly RunStep[]).includes(step)}
                  isChecked={chosen.has(step)}
                  onChange={(isChecked) => setChosen(toggled(chosen, step, isChecked))}
                />
              </li>
            ))}
          </ol>
        </FieldGroup>
        <SectionTitle>What a run is held to</SectionTitle>
        <div className="form-pair">
          {criteriaKeys.map((key) => {
            const { label, unit, hint } = CRITERIA_LABELS[key];
            return (
              <Field key={key} label={label} hint={hint} error={issueFor(`criteria.${key}`)}>
                <NumberInput
                  {...(unit ? { unit } : {})}
                  value={criteria[key]}
                  onChange={(value) => setCriteria({ ...criteria, [key]: value })}
                />
              </Field>
            );
          })}
        </div>
        <Field
          label="Reason"
          hint="What changed and why; printed with the version."
          error={issueFor('reason')}
        >
          <Textarea
            rows={2}
            maxLength={1000}
            value={reason}
            onChange={(event) => setReason(event.target.value)}
          />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
        <div className="form-actions">
          <Button kind="primary" type="submit" isPending={isPending}>
            Issue version {procedure.version + 1}
          </Button>
          <ButtonLink to={paths.procedure.to({ id: procedure.id })}>Cancel</ButtonLink>
        </div>
      </form>
    </>
  );
}

function toggled<T>(set: ReadonlySet<T>, one: T, isIn: boolean): Set<T> {
  const next = new Set(set);
  if (isIn) next.add(one);
  else next.delete(one);
  return next;
}

import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Standard } from '../../../../../shared/contracts/standards.ts';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Caution } from '../../../components/ui/caution.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { RadioGroup } from '../../../components/ui/radio-group.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useMakeLot } from '../preparation-api.ts';
import {
  dilutionOf,
  EMPTY_DILUTION,
  EMPTY_MADE_LOT,
  madeLotIssues,
  type DilutionDraft,
  type LotDraftOfPreparation,
} from '../preparation-draft.ts';
import { BalanceField, MadeLotFields, type Balance } from './made-lot-fields.tsx';
import { PreparationPreview } from './preparation-preview.tsx';

type NumberKey = 'stockReadingG' | 'waterReadingG' | 'airDensityKgM3' | 'waterBlankUsCm';

export interface DiluteFormProps {
  /** Lots that may be diluted. */
  lots: readonly Standard[];
  standardId: number | null;
  balances: readonly Balance[];
}

/** Dilute a lot by mass into a check solution, with the measured blank of the water. */
export function DiluteForm({ lots, standardId, balances }: DiluteFormProps) {
  const form = useRef<HTMLFormElement>(null);
  const first = lots.some((one) => one.id === standardId) ? String(standardId) : '';
  const [draft, setDraft] = useState<DilutionDraft>({ ...EMPTY_DILUTION, standardId: first });
  const [lot, setLot] = useState<LotDraftOfPreparation>({ ...EMPTY_MADE_LOT, openedLifeDays: 1 });
  const make = useMakeLot('diluted');
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const dilution = dilutionOf(draft);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const isDone = await submit(
      async () => {
        const made = await make.mutateAsync({ ...lot, dilution: dilution! });
        await navigate(paths.standard.to({ id: made.id }));
      },
      madeLotIssues(lot, dilution !== null),
    );
    if (isDone) say(`${lot.code.toUpperCase()} is made and in quarantine. Compare it before you release it.`);
  };
  const number = (key: NumberKey, label: string, unit: string, hint?: string) => (
    <Field label={label} hint={hint} error={issueFor(`dilution.${key}`)}>
      <NumberInput
        unit={unit}
        value={draft[key]}
        onChange={(value) => setDraft({ ...draft, [key]: value })}
      />
    </Field>
  );
  return (
    <>
      <Crumbs items={[{ label: 'Reference solutions', to: paths.standards.to() }]} />
      <PageHead
        name="Dilute a lot"
        sentence="A weighed part of a lot in weighed water, down to about 15 µS/cm. The check solution is in-house, not certified, and keeps the U of its lot."
      />
      <div className="two-columns">
        <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
          <Caution>
            Read the water in the same vessel and at the same time as the solution: carbon dioxide of the air
            alone is up to 1.1 µS/cm.
          </Caution>
          <SectionTitle>What is mixed</SectionTitle>
          <Field
            label="Lot"
            hint="Released lots of potassium chloride in water."
            error={issueFor('dilution.standardId')}
          >
            <Select
              placeholder="choose a lot"
              options={lots.map((one) => ({ value: String(one.id), label: `${one.code} · ${one.label}` }))}
              value={draft.standardId}
              onChange={(event) => setDraft({ ...draft, standardId: event.target.value })}
            />
          </Field>
          <div className="form-pair">
            {number('stockReadingG', 'Of the lot', 'g', 'Balance reading in air.')}
            {number('waterReadingG', 'Water', 'g', 'Balance reading in air.')}
          </div>
          <div className="form-pair">
            <BalanceField
              label="Balance"
              balances={balances}
              value={draft.balanceId}
              onChange={(balanceId) => setDraft({ ...draft, balanceId })}
              error={issueFor('dilution.balanceId')}
            />
            {number('airDensityKgM3', 'Density of the air', 'kg/m³', '1.2 near sea level.')}
          </div>
          <SectionTitle>The water alone</SectionTitle>
          {number('waterBlankUsCm', 'Water reads', 'µS/cm', 'Measured at 25 °C; at most 5.')}
          <RadioGroup
            legend="Carbon dioxide in blank and solution"
            options={[
              { value: 'same', label: 'The same', hint: 'Both closed, or both left in air until steady.' },
              { value: 'other', label: 'Not sure', hint: 'Up to 1.1 µS/cm is in doubt, and goes into U.' },
            ]}
            value={draft.isBlankInSameState ? 'same' : 'other'}
            onChange={(value) => setDraft({ ...draft, isBlankInSameState: value === 'same' })}
          />
          <SectionTitle>The lot it becomes</SectionTitle>
          <MadeLotFields lot={lot} onChange={setLot} issueFor={issueFor} />
          <FormRefusal>{issueFor('readings') ?? refusal}</FormRefusal>
          <div className="form-actions">
            <Button kind="primary" type="submit" isPending={isPending}>
              Make this lot
            </Button>
            <ButtonLink to={paths.standards.to()}>Cancel</ButtonLink>
          </div>
        </form>
        <div>
          <section aria-live="polite">
            <SectionTitle note="nothing is stored yet">What this dilution gives</SectionTitle>
            <PreparationPreview
              method="diluted"
              given={dilution}
              missing="Choose the lot and write both readings and what the water reads: value, U, budget and table appear here."
            />
          </section>
        </div>
      </div>
    </>
  );
}

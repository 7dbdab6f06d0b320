import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Caution } from '../../../components/ui/caution.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useMakeLot } from '../preparation-api.ts';
import {
  EMPTY_MADE_LOT,
  EMPTY_WEIGHING,
  madeLotIssues,
  weighingOf,
  type WeighingDraft,
} from '../preparation-draft.ts';
import { BalanceField, MadeLotFields, type Balance } from './made-lot-fields.tsx';
import { PreparationPreview } from './preparation-preview.tsx';

type NumberKey =
  | 'kclReadingG'
  | 'waterReadingG'
  | 'airDensityKgM3'
  | 'purityPercent'
  | 'dryingLossPercent'
  | 'waterBlankUsCm';

/** Weigh potassium chloride and water; the value and its U stand beside the readings before anything is stored. */
export function PrepareForm({ balances }: { balances: readonly Balance[] }) {
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState<WeighingDraft>(EMPTY_WEIGHING);
  const [salt, setSalt] = useState('');
  const [lot, setLot] = useState(EMPTY_MADE_LOT);
  const make = useMakeLot('prepared');
  const navigate = useNavigate();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const weighing = weighingOf(draft);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const issues = {
      ...madeLotIssues(lot, weighing !== null),
      salt: salt.trim() ? undefined : 'Write supplier, grade and lot of the salt, and how it was dried.',
    };
    const isDone = await submit(async () => {
      const made = await make.mutateAsync({ ...lot, weighing: weighing!, salt });
      await navigate(paths.standard.to({ id: made.id }));
    }, issues);
    if (isDone) say(`${lot.code.toUpperCase()} is made and in quarantine. Compare it before you release it.`);
  };
  const number = (key: NumberKey, label: string, unit: string, hint?: string) => (
    <Field label={label} hint={hint} error={issueFor(`weighing.${key}`)}>
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
        name="Prepare by weighing"
        sentence="Potassium chloride and water, both weighed in air. The lot is in-house, not certified, and in quarantine until somebody has compared it."
      />
      <div className="two-columns">
        <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
          <Caution>
            Dry the salt at 110 °C, let it cool in a desiccator, and read the water’s conductivity before you
            weigh. Reference solutions are not for drinking; site rules come first.
          </Caution>
          <SectionTitle>Readings of the balance</SectionTitle>
          <div className="form-pair">
            {number(
              'kclReadingG',
              'Potassium chloride',
              'g',
              '0.7455 g in a kilogram gives about 0.01 mol/kg.',
            )}
            <BalanceField
              label="Balance for the salt"
              balances={balances}
              value={draft.saltBalanceId}
              onChange={(saltBalanceId) => setDraft({ ...draft, saltBalanceId })}
              error={issueFor('weighing.saltBalanceId')}
            />
          </div>
          <div className="form-pair">
            {number('waterReadingG', 'Water', 'g', 'Weighed, not measured by volume.')}
            <BalanceField
              label="Balance for the water"
              balances={balances}
              value={draft.waterBalanceId}
              onChange={(waterBalanceId) => setDraft({ ...draft, waterBalanceId })}
              error={issueFor('weighing.waterBalanceId')}
            />
          </div>
          <SectionTitle>Salt, water and air</SectionTitle>
          <Field
            label="Salt"
            hint="Supplier, grade, lot, how it was dried; printed with the lot."
            error={issueFor('salt')}
          >
            <TextInput value={salt} maxLength={120} onChange={(event) => setSalt(event.target.value)} />
          </Field>
          <div className="form-pair">
            {number('purityPercent', 'Purity', '%', 'KCl in the dry salt.')}
            {number('dryingLossPercent', 'Moisture', '%', '0 when it was dried.')}
          </div>
          <div className="form-pair">
            {number('waterBlankUsCm', 'Water reads', 'µS/cm', 'Measured at 25 °C, before the salt.')}
            {number('airDensityKgM3', 'Density of the air', 'kg/m³', '1.2 near sea level.')}
          </div>
          <SectionTitle>The lot</SectionTitle>
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
            <SectionTitle note="nothing is stored yet">What these readings give</SectionTitle>
            <PreparationPreview
              method="prepared"
              given={weighing}
              missing="Write both readings and what the water reads: value, U and budget appear here."
            />
          </section>
        </div>
      </div>
    </>
  );
}

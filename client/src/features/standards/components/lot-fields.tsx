import type { StandardBasis, StandardMedium } from '../../../../../shared/contracts/vocabulary.ts';
import { standardBases, standardMedia } from '../../../../../shared/contracts/vocabulary.ts';
import { STANDARD_BASIS_LABELS, STANDARD_MEDIUM_LABELS } from '../../../../../shared/format/labels.ts';
import { formatCount } from '../../../../../shared/format/numbers.ts';
import { Checkbox } from '../../../components/ui/checkbox.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import type { LotDraft } from '../draft.ts';
import { readTemperatureTable } from '../draft.ts';
import { solutionName } from '../model.ts';

export interface LotFieldsProps {
  draft: LotDraft;
  onChange: (draft: LotDraft) => void;
  issueFor: (path: string) => string | undefined;
}

function setterOf({ draft, onChange }: LotFieldsProps) {
  return <Key extends keyof LotDraft>(key: Key, value: LotDraft[Key]) => onChange({ ...draft, [key]: value });
}

export function BottleFields(props: LotFieldsProps) {
  const { draft, issueFor } = props;
  const set = setterOf(props);
  const text = (key: 'code' | 'producer' | 'product', label: string, hint: string) => (
    <Field label={label} hint={hint} error={issueFor(key)}>
      <TextInput value={draft[key]} maxLength={120} onChange={(event) => set(key, event.target.value)} />
    </Field>
  );
  return (
    <>
      <div className="form-pair">
        {text('code', 'Code of the lot', 'As devices and people name it: letters, digits, hyphens.')}
        {text('producer', 'Producer', 'Who made it and signs for its value.')}
      </div>
      {text('product', 'Name on the label', 'Whole, as printed.')}
      <Checkbox
        label="Prepared in house"
        hint="Weighed and signed here; never called certified."
        isChecked={draft.isInHouse}
        onChange={(isInHouse) => set('isInHouse', isInHouse)}
      />
    </>
  );
}

const NOMINALS = ['0.01', '0.1', '1'].map((value) => ({ value, label: value }));

export function SolutionFields(props: LotFieldsProps) {
  const { draft, onChange, issueFor } = props;
  const isByBasis = draft.basis !== 'other';
  const name = solutionName({
    basis: draft.basis,
    nominal: (Number(draft.nominal) || null) as 0.01 | null,
    product: draft.product,
  });
  return (
    <>
      <SectionTitle
        note={isByBasis ? `shown everywhere as ${name}` : 'shown everywhere by the name on its label'}
      >
        Solution
      </SectionTitle>
      <div className="form-pair">
        <Field label="Medium" error={issueFor('medium')}>
          <Select
            options={optionsFrom(standardMedia, STANDARD_MEDIUM_LABELS)}
            value={draft.medium}
            onChange={(event) => {
              const medium = event.target.value as StandardMedium;
              onChange({ ...draft, medium, basis: medium === 'other' ? 'other' : draft.basis });
            }}
          />
        </Field>
        <Field
          label="Basis"
          hint="0.01 molal, 0.01 demal and 0.01 molar differ by up to 0.3 %."
          error={issueFor('basis')}
        >
          <Select
            options={optionsFrom(standardBases, STANDARD_BASIS_LABELS)}
            value={draft.basis}
            onChange={(event) => onChange({ ...draft, basis: event.target.value as StandardBasis })}
          />
        </Field>
      </div>
      {isByBasis ? (
        <Field label="Nominal concentration on that basis" error={issueFor('nominal')}>
          <Select
            options={NOMINALS}
            value={draft.nominal}
            onChange={(event) => onChange({ ...draft, nominal: event.target.value })}
          />
        </Field>
      ) : null}
    </>
  );
}

export function CertificateFields(props: LotFieldsProps) {
  const { draft, issueFor } = props;
  const set = setterOf(props);
  const table = readTemperatureTable(draft.temperatureTable);
  const tableHint =
    table.rows.length > 0
      ? `${formatCount(table.rows.length, 'row')} read: ${table.rows.map((row) => row.temperatureC).join(', ')} °C.`
      : 'One temperature a line, lowest first: °C, a space, µS/cm. It can be pasted.';
  const day = (key: 'issuedOn' | 'expiresOn', label: string) => (
    <Field label={label} error={issueFor(key)}>
      <TextInput type="date" value={draft[key]} onChange={(event) => set(key, event.target.value)} />
    </Field>
  );
  const number = (key: NumberKey, label: string, unit: string | undefined, hint?: string) => (
    <Field label={label} hint={hint} isOptional={MAY_BE_EMPTY.has(key)} error={issueFor(key)}>
      <NumberInput unit={unit} value={draft[key]} onChange={(value) => set(key, value)} />
    </Field>
  );
  return (
    <>
      <SectionTitle>Certificate</SectionTitle>
      <div className="form-pair">
        {number(
          'certifiedConductivityUsCm',
          'Value',
          'µS/cm',
          'Empty: the published table of its basis is used.',
        )}
        {number('referenceTemperatureC', 'at', '°C')}
      </div>
      <div className="form-pair">
        {number('expandedUncertaintyUsCm', 'Expanded uncertainty U', 'µS/cm', 'In µS/cm, not in per cent.')}
        {number('coverageFactor', 'Coverage factor k', undefined, 'Often 2.')}
      </div>
      {number(
        'coverageProbabilityPercent',
        'Coverage probability',
        '%',
        'Where the certificate states one, often about 95; else leave it empty.',
      )}
      <Field label="Temperature table" isOptional hint={tableHint} error={issueFor('temperatureTable')}>
        <Textarea
          rows={5}
          className="font-mono"
          placeholder={'20  1278.3\n25  1413.1\n30  1552.0'}
          value={draft.temperatureTable}
          onChange={(event) => set('temperatureTable', event.target.value)}
        />
      </Field>
      <Field
        label="Traceability"
        hint="As the certificate states it, with its number."
        error={issueFor('traceability')}
      >
        <Textarea
          rows={3}
          maxLength={4000}
          value={draft.traceability}
          onChange={(event) => set('traceability', event.target.value)}
        />
      </Field>
      <div className="form-pair">
        {day('issuedOn', 'Issued')}
        {day('expiresOn', 'Last day of use')}
      </div>
      <div className="form-pair">
        {number(
          'openedLifeDays',
          'Opened bottles may be used for',
          'days',
          'Empty: until the last day of the lot.',
        )}
        <Field label="Storage" isOptional error={issueFor('storage')}>
          <TextInput
            value={draft.storage}
            maxLength={400}
            placeholder="15 to 25 °C, dark"
            onChange={(event) => set('storage', event.target.value)}
          />
        </Field>
      </div>
    </>
  );
}

type NumberKey =
  | 'certifiedConductivityUsCm'
  | 'referenceTemperatureC'
  | 'expandedUncertaintyUsCm'
  | 'coverageFactor'
  | 'coverageProbabilityPercent'
  | 'openedLifeDays';

const MAY_BE_EMPTY: ReadonlySet<NumberKey> = new Set(['coverageProbabilityPercent', 'openedLifeDays']);

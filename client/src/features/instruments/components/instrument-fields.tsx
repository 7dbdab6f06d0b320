import { uncertaintyUnits, type UncertaintyUnit } from '../../../../../shared/contracts/instruments.ts';
import { instrumentKinds, type InstrumentKind } from '../../../../../shared/contracts/vocabulary.ts';
import {
  INSTRUMENT_KIND_LABELS,
  UNCERTAINTY_UNIT_LABELS,
} from '../../../../../shared/format/reference-labels.ts';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { USUAL_UNIT, type InstrumentDraft } from '../model.ts';

export interface InstrumentFieldsProps {
  draft: InstrumentDraft;
  onChange: (draft: InstrumentDraft) => void;
  issueFor: (path: string) => string | undefined;
  /** The kind never changes once it is registered. */
  isKindFixed?: boolean;
}

/** What it is, and what its certificate says of it. */
export function InstrumentFields({ draft, onChange, issueFor, isKindFixed = false }: InstrumentFieldsProps) {
  const text = (key: 'name' | 'serial' | 'certificateNumber', label: string, hint?: string) => (
    <Field label={label} hint={hint} error={issueFor(key)}>
      <TextInput
        value={draft[key]}
        maxLength={120}
        onChange={(event) => onChange({ ...draft, [key]: event.target.value })}
      />
    </Field>
  );
  const day = (key: 'issuedOn' | 'dueOn', label: string) => (
    <Field label={label} error={issueFor(key)}>
      <TextInput
        type="date"
        value={draft[key]}
        onChange={(event) => onChange({ ...draft, [key]: event.target.value })}
      />
    </Field>
  );
  const unit = UNCERTAINTY_UNIT_LABELS[draft.uncertaintyUnit];
  return (
    <>
      <div className="form-pair">
        {isKindFixed ? null : (
          <Field label="Kind" error={issueFor('kind')}>
            <Select
              options={optionsFrom(instrumentKinds, INSTRUMENT_KIND_LABELS)}
              value={draft.kind}
              onChange={(event) => {
                const kind = event.target.value as InstrumentKind;
                onChange({ ...draft, kind, uncertaintyUnit: USUAL_UNIT[kind] });
              }}
            />
          </Field>
        )}
        {text('name', 'Name', 'As people call it.')}
      </div>
      {text('serial', 'Serial number', 'From the instrument itself.')}
      <SectionTitle>Certificate</SectionTitle>
      <div className="form-pair">
        {text('certificateNumber', 'Number')}
        <Field label="U is stated in" error={issueFor('uncertaintyUnit')}>
          <Select
            options={optionsFrom(uncertaintyUnits, UNCERTAINTY_UNIT_LABELS)}
            value={draft.uncertaintyUnit}
            onChange={(event) =>
              onChange({ ...draft, uncertaintyUnit: event.target.value as UncertaintyUnit })
            }
          />
        </Field>
      </div>
      <div className="form-pair">
        <Field label="Expanded uncertainty U" error={issueFor('expandedUncertainty')}>
          <NumberInput
            unit={unit}
            value={draft.expandedUncertainty}
            onChange={(expandedUncertainty) => onChange({ ...draft, expandedUncertainty })}
          />
        </Field>
        <Field label="Coverage factor k" hint="Often 2." error={issueFor('coverageFactor')}>
          <NumberInput
            value={draft.coverageFactor}
            onChange={(coverageFactor) => onChange({ ...draft, coverageFactor })}
          />
        </Field>
      </div>
      <Field
        label="Correction"
        hint="Added to what it shows; 0 when there is none."
        error={issueFor('correction')}
      >
        <NumberInput
          unit={unit}
          value={draft.correction}
          onChange={(correction) => onChange({ ...draft, correction })}
        />
      </Field>
      <div className="form-pair">
        {day('issuedOn', 'Issued')}
        {day('dueOn', 'Due again')}
      </div>
      <Field
        label="Traceability"
        isOptional
        hint="As the certificate states it."
        error={issueFor('traceability')}
      >
        <Textarea
          rows={3}
          maxLength={4000}
          value={draft.traceability}
          onChange={(event) => onChange({ ...draft, traceability: event.target.value })}
        />
      </Field>
    </>
  );
}

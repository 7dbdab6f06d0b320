import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import type { LotDraftOfPreparation } from '../preparation-draft.ts';

export interface Balance {
  id: number;
  code: string;
  name: string;
}

interface BalanceFieldProps {
  label: string;
  balances: readonly Balance[];
  value: string;
  onChange: (value: string) => void;
  error: string | undefined;
}

/** Which balance: its certificate brings the U of the readings. */
export function BalanceField({ label, balances, value, onChange, error }: BalanceFieldProps) {
  return (
    <Field label={label} hint="Its certificate brings the U of the reading." error={error}>
      <Select
        placeholder="not from the list: U is assumed"
        options={balances.map((one) => ({ value: String(one.id), label: `${one.code}, ${one.name}` }))}
        value={value}
        onChange={(event) => onChange(event.target.value)}
      />
    </Field>
  );
}

export interface MadeLotFieldsProps {
  lot: LotDraftOfPreparation;
  onChange: (lot: LotDraftOfPreparation) => void;
  issueFor: (path: string) => string | undefined;
}

/** What the new lot is called and how long it may be used. */
export function MadeLotFields({ lot, onChange, issueFor }: MadeLotFieldsProps) {
  return (
    <>
      <div className="form-pair">
        <Field
          label="Code of the lot"
          hint="As on the labels: letters, digits, hyphens."
          error={issueFor('code')}
        >
          <TextInput
            value={lot.code}
            maxLength={40}
            onChange={(event) => onChange({ ...lot, code: event.target.value })}
          />
        </Field>
        <Field label="Last day of use" hint="Unopened." error={issueFor('expiresOn')}>
          <TextInput
            type="date"
            value={lot.expiresOn}
            onChange={(event) => onChange({ ...lot, expiresOn: event.target.value })}
          />
        </Field>
      </div>
      <div className="form-pair">
        <Field
          label="After opening"
          isOptional
          hint="Empty: until its last day."
          error={issueFor('openedLifeDays')}
        >
          <NumberInput
            unit="days"
            value={lot.openedLifeDays}
            onChange={(openedLifeDays) => onChange({ ...lot, openedLifeDays })}
          />
        </Field>
        <Field label="Storage" isOptional hint="How it is kept." error={issueFor('storage')}>
          <TextInput
            value={lot.storage}
            maxLength={400}
            onChange={(event) => onChange({ ...lot, storage: event.target.value })}
          />
        </Field>
      </div>
    </>
  );
}

import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Select } from '../../../components/ui/select.tsx';
import type { CalculatorField, Values } from '../model.ts';
import { shownFields } from '../model.ts';

export interface LotOption {
  value: string;
  label: string;
}

export interface CalculatorInputsProps {
  fields: readonly CalculatorField[];
  values: Values;
  lots: readonly LotOption[];
  onChange: (name: string, value: string) => void;
  issueFor: (path: string) => string | undefined;
}

/** The inputs of one calculator, their units fixed. */
export function CalculatorInputs({ fields, values, lots, onChange, issueFor }: CalculatorInputsProps) {
  return (
    <form className="calculator-inputs" onSubmit={(event) => event.preventDefault()} noValidate>
      {shownFields(fields, values).map((field) => (
        <Field
          key={field.name}
          label={field.label}
          hint={field.hint}
          error={fault(field, values) ?? issueFor(field.path ?? field.name)}
          className={field.isWide ? 'is-wide' : undefined}
        >
          <Input field={field} text={values[field.name] ?? ''} lots={lots} onChange={onChange} />
        </Field>
      ))}
    </form>
  );
}

function fault(field: CalculatorField, values: Values): string | undefined {
  return values[field.name] === 'NaN' ? 'This is not a number.' : undefined;
}

interface InputProps extends Pick<CalculatorInputsProps, 'lots' | 'onChange'> {
  field: CalculatorField;
  text: string;
}

function Input({ field, text, lots, onChange }: InputProps) {
  if (field.options) {
    const isLots = field.options === 'lots';
    return (
      <Select
        {...(isLots ? { placeholder: lots.length > 0 ? 'choose a lot' : 'no lot is registered' } : {})}
        options={field.options === 'lots' ? lots : field.options}
        value={text}
        onChange={(event) => onChange(field.name, event.target.value)}
      />
    );
  }
  return (
    <NumberInput
      {...(field.unit ? { unit: field.unit } : {})}
      value={text === '' ? null : Number(text)}
      onChange={(value) => onChange(field.name, value === null ? '' : String(value))}
    />
  );
}

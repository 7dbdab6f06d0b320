import { RadioGroup as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';
import { useId } from 'react';
import { FieldGroup } from './field.tsx';

export interface RadioOption {
  value: string;
  label: ReactNode;
  /** What choosing it means, in a sentence. */
  hint?: ReactNode;
  isDisabled?: boolean;
}

export interface RadioGroupProps {
  legend: string;
  hint?: ReactNode;
  error?: string | null | undefined;
  options: readonly RadioOption[];
  value: string | null;
  onChange: (value: string) => void;
}

/** One of a few, all of them visible with what they mean; arrow keys move. */
export function RadioGroup({ legend, hint, error, options, value, onChange }: RadioGroupProps) {
  const id = useId();
  return (
    <FieldGroup legend={legend} hint={hint} error={error}>
      <Primitive.Root value={value ?? ''} onValueChange={onChange} aria-label={legend}>
        {options.map((option, i) => (
          <label key={option.value} className="choice" htmlFor={`${id}-${i}`}>
            <Primitive.Item
              id={`${id}-${i}`}
              value={option.value}
              disabled={option.isDisabled}
              className="choice-box choice-round"
              aria-describedby={option.hint ? `${id}-${i}-hint` : undefined}
            >
              <Primitive.Indicator />
            </Primitive.Item>
            <span>{option.label}</span>
            {option.hint ? (
              <span className="choice-hint" id={`${id}-${i}-hint`}>
                {option.hint}
              </span>
            ) : null}
          </label>
        ))}
      </Primitive.Root>
    </FieldGroup>
  );
}

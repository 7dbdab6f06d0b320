import { Checkbox as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';
import { useId } from 'react';

export interface CheckboxProps {
  label: ReactNode;
  hint?: ReactNode;
  isChecked: boolean;
  onChange: (isChecked: boolean) => void;
  isDisabled?: boolean;
  name?: string;
}

/** One yes-or-no; the whole line can be pressed. */
export function Checkbox({ label, hint, isChecked, onChange, isDisabled, name }: CheckboxProps) {
  const id = useId();
  return (
    <div>
      <label className="choice" htmlFor={id}>
        <Primitive.Root
          id={id}
          className="choice-box"
          checked={isChecked}
          onCheckedChange={(state) => onChange(state === true)}
          disabled={isDisabled}
          name={name}
          aria-describedby={hint ? `${id}-hint` : undefined}
        >
          <Primitive.Indicator>
            <svg width="14" height="12" viewBox="0 0 14 12" aria-hidden="true">
              <path d="M1 6l4 4 8-9" fill="none" stroke="currentColor" strokeWidth="2.5" />
            </svg>
          </Primitive.Indicator>
        </Primitive.Root>
        <span>{label}</span>
        {hint ? (
          <span className="choice-hint" id={`${id}-hint`}>
            {hint}
          </span>
        ) : null}
      </label>
    </div>
  );
}

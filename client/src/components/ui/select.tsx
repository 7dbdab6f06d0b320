import type { ComponentProps } from 'react';
import { classNames } from './button.tsx';
import { Chevron } from './chevron.tsx';
import { useFieldAttributes } from './field.tsx';

export interface SelectOption {
  value: string;
  label: string;
  isDisabled?: boolean;
}

export interface SelectProps extends Omit<ComponentProps<'select'>, 'children'> {
  options: readonly SelectOption[];
  /** A first, empty entry such as "choose a site". */
  placeholder?: string;
}

/** The browser's own select: it works with gloves, screen readers and every phone. */
export function Select({ options, placeholder, className, ...rest }: SelectProps) {
  const wiring = useFieldAttributes(rest);
  return (
    <div className="select">
      <select {...rest} {...wiring} className={classNames('control', className)}>
        {placeholder === undefined ? null : <option value="">{placeholder}</option>}
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.isDisabled}>
            {option.label}
          </option>
        ))}
      </select>
      <Chevron />
    </div>
  );
}

/** Options from a list of codes and its table of words. */
export function optionsFrom<Code extends string>(
  codes: readonly Code[],
  words: Readonly<Record<Code, string>>,
): SelectOption[] {
  return codes.map((code) => ({ value: code, label: words[code] }));
}

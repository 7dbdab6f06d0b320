import type { ComponentProps } from 'react';
import { useState } from 'react';
import { parseDecimal } from '../../../../shared/format/numbers.ts';
import { classNames } from './button.tsx';
import { useFieldAttributes } from './field.tsx';

export interface NumberInputProps extends Omit<
  ComponentProps<'input'>,
  'value' | 'defaultValue' | 'onChange' | 'type'
> {
  /** null while the field is empty; NaN while what stands there is no number. */
  value: number | null;
  /** Gives the number, null for an empty field, NaN for text that is no number, so that a schema can refuse it. */
  onChange: (value: number | null) => void;
  /** Printed right of the field and read with it: µS/cm, °C, %. */
  unit?: string;
}

/**
 * A decimal as text: point or comma, spaces as typed, no spinner that a scroll wheel could turn. What was typed stays
 * as typed.
 */
export function NumberInput({ value, onChange, unit, className, ...rest }: NumberInputProps) {
  const wiring = useFieldAttributes(rest);
  const [text, setText] = useState(() => textOf(value));
  // The text is kept while it means the same number, so that "0.50" is not rewritten to "0.5" under the fingers.
  const shown = Object.is(readText(text), value) ? text : textOf(value);
  const unitId = unit && wiring.id ? `${wiring.id}-unit` : undefined;
  const input = (
    <input
      {...rest}
      {...wiring}
      aria-describedby={[unitId, wiring['aria-describedby']].filter(Boolean).join(' ') || undefined}
      type="text"
      inputMode="decimal"
      autoComplete="off"
      className={classNames('control', className)}
      value={shown}
      onChange={(event) => {
        setText(event.target.value);
        onChange(readText(event.target.value));
      }}
    />
  );
  if (!unit) return input;
  return (
    <div className="control-with-unit">
      {input}
      <span className="control-unit" id={unitId}>
        {unit}
      </span>
    </div>
  );
}

function readText(text: string): number | null {
  return text.trim() === '' ? null : (parseDecimal(text) ?? Number.NaN);
}

function textOf(value: number | null): string {
  return value === null || Number.isNaN(value) ? '' : String(value);
}

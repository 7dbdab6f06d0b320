import type { Figure, PlannedAnswer } from '../../../../shared/contracts/calculations.ts';
import type { Outcome } from '../../../../shared/contracts/vocabulary.ts';
import { listInWords } from '../../../../shared/format/labels.ts';
import type { ValueWithUncertainty } from '../../../../shared/format/numbers.ts';
import { formatNumber, formatWithUncertainty, NO_BREAK_SPACE } from '../../../../shared/format/numbers.ts';
import type { StripInput } from '../../../../shared/format/strip-geometry.ts';

/** What stands in the fields, by name: a number as its shortest text, a choice as its code. */
export type Values = Readonly<Record<string, string>>;

export interface CalculatorField {
  name: string;
  /** Path in the request where it differs from the name. */
  path?: string;
  label: string;
  unit?: string;
  hint?: string;
  initial: string;
  /** A choice; `lots` are the registered ones. Absent for a number. */
  options?: readonly { value: string; label: string }[] | 'lots';
  isShown?: (values: Values) => boolean;
  /** Takes the whole width of a phone. */
  isWide?: boolean;
}

export const shownFields = (fields: readonly CalculatorField[], values: Values): CalculatorField[] =>
  fields.filter((field) => field.isShown?.(values) ?? true);

/** The values a calculator opens with: those of the address where it gives any. */
export function initialValues(fields: readonly CalculatorField[], read: (name: string) => string): Values {
  return Object.fromEntries(fields.map((field) => [field.name, read(field.name) || field.initial]));
}

/** Names of shown fields that hold no usable value yet. */
export function missingFields(fields: readonly CalculatorField[], values: Values): CalculatorField[] {
  return shownFields(fields, values).filter((field) => {
    const text = values[field.name] ?? '';
    return text === '' || (!field.options && !Number.isFinite(Number(text)));
  });
}

/** What to do before there can be a result. */
export function missingWords(missing: readonly CalculatorField[]): string {
  const names = listInWords(missing.map((field) => `“${field.label}”`));
  return `Fill in ${names} with a number, and the result stands here.`;
}

/** Digits for a figure whose U is not stated: enough that no bench instrument loses any. */
const DIGITS_WITHOUT_U = 6;

/** A figure as printed: U with two digits and the value to match, or the value with more digits than a bench has. */
export function figureText(
  figure: Pick<Figure, 'value' | 'unit' | 'expandedUncertainty'>,
): ValueWithUncertainty {
  const { value, unit, expandedUncertainty } = figure;
  if (expandedUncertainty !== null && expandedUncertainty > 0)
    return formatWithUncertainty({ value, expandedUncertainty, unit });
  const text = formatNumber(value, { significantDigits: DIGITS_WITHOUT_U });
  const plain = text.includes('.') ? text.replace(/0+$/, '').replace(/\.$/, '') : text;
  return { value: plain, uncertainty: null, unit, decimals: 0, text: plain + NO_BREAK_SPACE + unit };
}

/** What is known about U: its coverage factor, or that the equation adds none of its own. */
export function uncertaintyWords(figure: Pick<Figure, 'expandedUncertainty' | 'coverageFactor'>): string {
  if (figure.expandedUncertainty === null) return 'U is that of what you put in';
  return `U with k = ${formatNumber(figure.coverageFactor, { significantDigits: 2 })}`;
}

/** The strip of a probe that reads exactly right: what is left between the guard bands is what the method can show. */
export function plannedStrip(answer: PlannedAnswer, tolerancePercent: number): StripInput {
  const guardBand = Math.max(0, tolerancePercent - answer.acceptanceLimitPercent);
  const outcome: Outcome = answer.canDecide ? 'within-clear' : 'within-unsure';
  return {
    tolerance: tolerancePercent,
    guardBand,
    error: 0,
    expandedUncertainty: answer.expandedUncertaintyPercent,
    coverageFactor: answer.coverageFactor,
    outcome,
    earlier: [],
    what: 'A probe that reads exactly right',
  };
}

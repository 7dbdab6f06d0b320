/**
 * What the science refuses, and the guards that make it refuse: no function of this folder ever
 * answers NaN, and every refusal says which quantity, which value, which limits and what to do.
 */

export type ScienceErrorCode =
  'science.out-of-domain' | 'science.refused-model' | 'science.inconsistent-input' | 'science.invalid-input';

/** What every refusal of the science has in common: a stable code and a plain sentence. */
export class ScienceError extends Error {
  readonly code: ScienceErrorCode;

  constructor(code: ScienceErrorCode, message: string) {
    super(message);
    this.name = new.target.name;
    this.code = code;
  }
}

export type Domain = {
  /** The quantity in words, as a sentence begins: "temperature". */
  quantity: string;
  value: number;
  /** Empty for a pure number. */
  unit: string;
  /** Lowest accepted value; null when there is none. */
  lower: number | null;
  /** Highest accepted value; null when there is none. */
  upper: number | null;
  /** What to do instead, as a sentence. */
  advice?: string;
};

/** A value outside the range in which an equation or a table is known to hold. */
export class OutOfDomainError extends ScienceError {
  readonly quantity: string;
  readonly value: number;
  readonly unit: string;
  readonly lower: number | null;
  readonly upper: number | null;

  constructor(domain: Domain) {
    super('science.out-of-domain', outOfDomainMessage(domain));
    this.quantity = domain.quantity;
    this.value = domain.value;
    this.unit = domain.unit;
    this.lower = domain.lower;
    this.upper = domain.upper;
  }
}

/** The values are in range, but the model asked for does not describe this case. */
export class RefusedModelError extends ScienceError {
  readonly model: string;
  readonly reason: string;

  constructor({ model, reason, advice }: { model: string; reason: string; advice?: string }) {
    super(
      'science.refused-model',
      `${model} does not apply: ${reason}.${advice === undefined ? '' : ` ${advice}`}`,
    );
    this.model = model;
    this.reason = reason;
  }
}

/** Two inputs that cannot both be true (a certificate whose table contradicts its own value). */
export class InconsistentInputError extends ScienceError {
  readonly quantity: string;

  constructor({ quantity, reason, advice }: { quantity: string; reason: string; advice?: string }) {
    super('science.inconsistent-input', `${quantity}: ${reason}.${advice === undefined ? '' : ` ${advice}`}`);
    this.quantity = quantity;
  }
}

/** An input that is not a number in a range: an empty list, an unknown choice, lists of unequal length. */
export class InvalidInputError extends ScienceError {
  constructor(message: string) {
    super('science.invalid-input', message);
  }
}

function withUnit(value: number, unit: string): string {
  return unit === '' ? String(value) : `${value} ${unit}`;
}

function limitsInWords({ lower, upper, unit }: Domain): string {
  if (lower !== null && upper !== null) return `from ${lower} to ${withUnit(upper, unit)}`;
  if (lower !== null) return `at least ${withUnit(lower, unit)}`;
  if (upper !== null) return `at most ${withUnit(upper, unit)}`;
  return 'a finite number';
}

function outOfDomainMessage(domain: Domain): string {
  const { quantity, value, unit, advice } = domain;
  const stated = Number.isFinite(value) ? withUnit(value, unit) : 'not a finite number';
  const sentence = `${quantity} is ${stated}; it must be ${limitsInWords(domain)}.`;
  return advice === undefined ? sentence : `${sentence} ${advice}`;
}

/** Returns `value` when it is a finite number, refuses it otherwise. */
export function requireFinite(quantity: string, value: number, unit: string): number {
  if (Number.isFinite(value)) return value;
  throw new OutOfDomainError({ quantity, value, unit, lower: null, upper: null });
}

/** Returns `value` when lower <= value <= upper (both ends belong to the range), refuses it otherwise. */
export function requireWithin(
  quantity: string,
  value: number,
  unit: string,
  lower: number,
  upper: number,
  advice?: string,
): number {
  // Written so that NaN, which fails every comparison, is refused too.
  if (value >= lower && value <= upper) return value;
  throw new OutOfDomainError({
    quantity,
    value,
    unit,
    lower,
    upper,
    ...(advice === undefined ? {} : { advice }),
  });
}

/** Returns `value` when it is finite and >= 0, refuses it otherwise. */
export function requireNonNegative(quantity: string, value: number, unit: string): number {
  if (value >= 0 && value < Infinity) return value;
  throw new OutOfDomainError({ quantity, value, unit, lower: 0, upper: null });
}

/** Returns `value` when it is finite and > 0, refuses it otherwise. */
export function requirePositive(quantity: string, value: number, unit: string): number {
  if (value > 0 && value < Infinity) return value;
  throw new OutOfDomainError({
    quantity,
    value,
    unit,
    lower: 0,
    upper: null,
    advice: 'Zero itself is refused too.',
  });
}

/** Returns `count` when it is a whole number of at least `minimum`, refuses it otherwise. */
export function requireCount(quantity: string, count: number, minimum: number): number {
  if (Number.isInteger(count) && count >= minimum) return count;
  throw new OutOfDomainError({ quantity, value: count, unit: '', lower: minimum, upper: null });
}

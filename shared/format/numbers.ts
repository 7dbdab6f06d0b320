/**
 * Numbers as text: one rule for the screen, the calibration record and mail.
 *
 * Separators are chosen from what both bundled fonts contain: U+2009 (thin space) groups digits, U+2212 is the
 * minus, U+00A0 keeps a unit with its figure. U+202F is in neither font and would fall back to another face.
 */

/** Between groups of three digits [SI Brochure 9, 5.4.4]. */
export const GROUP_SEPARATOR = '\u2009';
/** The minus sign; a hyphen is shorter and is read as a range. */
export const MINUS = '\u2212';
/** Keeps a figure, its ± and its unit on one line. */
export const NO_BREAK_SPACE = '\u00a0';
/** Printed where there is no value. */
export const NO_VALUE = '–';

export interface FormatNumberOptions {
  /** Digits after the point. Without it and without `significantDigits`, the shortest exact text is used. */
  decimals?: number;
  /** Significant digits; ignored when `decimals` is given. */
  significantDigits?: number;
  /** Appended after a no-break space. */
  unit?: string;
  /** `always` puts + before a positive value; zero never carries a sign. */
  sign?: 'negative' | 'always';
}

/**
 * A number as text: grouped from 1 000, true minus, and no negative zero.
 * @example formatNumber(1078.5, { decimals: 1, unit: 'µS/cm' }) // '1 078.5 µS/cm'
 */
export function formatNumber(value: number | null | undefined, options: FormatNumberOptions = {}): string {
  if (value == null || !Number.isFinite(value)) return NO_VALUE;
  const plain = decimalText(Math.abs(value), options);
  const isZero = Number(plain) === 0;
  const sign = isZero ? '' : value < 0 ? MINUS : options.sign === 'always' ? '+' : '';
  const unit = options.unit ? NO_BREAK_SPACE + options.unit : '';
  return sign + groupDigits(plain) + unit;
}

/** A number with its sign always shown, as errors are written: `+1.23`, `−0.40`, `0.00`. */
export function formatSigned(value: number | null | undefined, decimals: number, unit?: string): string {
  return formatNumber(value, { decimals, sign: 'always', ...(unit === undefined ? {} : { unit }) });
}

export interface ValueWithUncertainty {
  /** The value, rounded to the last digit of U. */
  value: string;
  /** U with two significant digits, or null where U cannot be known. */
  uncertainty: string | null;
  unit: string;
  /** Digits after the point of both figures. */
  decimals: number;
  /** `51.2 ± 1.3 mS/cm` on one line. */
  text: string;
}

export interface FormatWithUncertaintyOptions {
  value: number | null | undefined;
  /** Expanded uncertainty in the unit of the value; absent where it cannot be known. */
  expandedUncertainty?: number | null;
  unit: string;
  /** Errors carry their sign always. */
  sign?: 'negative' | 'always';
  /** Digits after the point when there is no U. */
  decimalsWithoutUncertainty?: number;
}

/**
 * A value with its expanded uncertainty: U with two significant digits, the value to match [GUM 7.2.6].
 * A U of a hundred or more rounds the value to tens or hundreds too.
 */
export function formatWithUncertainty(options: FormatWithUncertaintyOptions): ValueWithUncertainty {
  const { value, expandedUncertainty: U, unit, sign = 'negative' } = options;
  const hasValue = value != null && Number.isFinite(value);
  if (!hasValue || U == null || !Number.isFinite(U) || U <= 0) {
    const fallback = options.decimalsWithoutUncertainty;
    const decimals = fallback ?? 0;
    const text = formatNumber(
      value,
      fallback === undefined ? { significantDigits: 4, sign } : { decimals, sign },
    );
    return { value: text, uncertainty: null, unit, decimals, text: text + NO_BREAK_SPACE + unit };
  }
  const place = uncertaintyPlace(U);
  const decimals = Math.max(0, place);
  const valueText = formatNumber(roundToPlace(value, place), { decimals, sign });
  const uncertainty = formatNumber(roundToPlace(U, place), { decimals });
  const text = [valueText, '±', uncertainty, unit].join(NO_BREAK_SPACE);
  return { value: valueText, uncertainty, unit, decimals, text };
}

/**
 * The decimal place of the second significant digit of U: 2 for 0.85, 1 for 1.3, 0 for 17, −1 for 170.
 * Rounding may carry (0.0996 becomes 0.10), so the place is taken after rounding.
 */
export function uncertaintyPlace(expandedUncertainty: number): number {
  const [, exponent] = expandedUncertainty.toExponential(1).split('e');
  return 1 - Number(exponent);
}

/** A probability as a figure: never 100 % and never 0 %, because neither is ever known. */
export function formatProbability(probability: number | null | undefined): string {
  if (probability == null || !Number.isFinite(probability)) return NO_VALUE;
  const unit = NO_BREAK_SPACE + '%';
  if (probability > 0.99) return '>' + NO_BREAK_SPACE + '99' + unit;
  if (probability < 0.01) return '<' + NO_BREAK_SPACE + '1' + unit;
  // Rounded down: 89.6 % must not be read as having reached a 90 % policy.
  return formatNumber(Math.floor(probability * 100 + 1e-9), { decimals: 0 }) + unit;
}

export type ConductivityUnit = 'µS/cm' | 'mS/cm';

/** From here on conductivity is written in mS/cm unless the point says otherwise. */
const MILLISIEMENS_FROM_US_CM = 10_000;

export interface FormatConductivityOptions {
  conductivityUsCm: number | null | undefined;
  expandedUncertaintyUsCm?: number | null;
  unit?: ConductivityUnit;
  decimalsWithoutUncertainty?: number;
}

/** A conductivity held in µS/cm, written in the unit asked for, or mS/cm from 10 000 µS/cm up. */
export function formatConductivity(options: FormatConductivityOptions): ValueWithUncertainty {
  const { conductivityUsCm, expandedUncertaintyUsCm, decimalsWithoutUncertainty } = options;
  const unit = options.unit ?? conductivityUnitFor(conductivityUsCm);
  const factor = unit === 'mS/cm' ? 1000 : 1;
  return formatWithUncertainty({
    value: conductivityUsCm == null ? conductivityUsCm : conductivityUsCm / factor,
    expandedUncertainty: expandedUncertaintyUsCm == null ? null : expandedUncertaintyUsCm / factor,
    unit,
    ...(decimalsWithoutUncertainty === undefined ? {} : { decimalsWithoutUncertainty }),
  });
}

/** The unit a conductivity reads best in. */
export function conductivityUnitFor(conductivityUsCm: number | null | undefined): ConductivityUnit {
  return conductivityUsCm != null && Math.abs(conductivityUsCm) >= MILLISIEMENS_FROM_US_CM
    ? 'mS/cm'
    : 'µS/cm';
}

/** A number that a person typed: point or comma as decimal sign, spaces as groups; null when it is no number. */
export function parseDecimal(text: string): number | null {
  const plain = text
    .trim()
    .replace(/[\s\u2009\u202f\u00a0]/g, '')
    .replace(/[\u2212\u2013]/g, '-')
    .replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)) return null;
  const value = Number(plain);
  return Number.isFinite(value) ? value : null;
}

/** A count of things with its noun: `1 probe`, `12 probes`, `no probes`. */
export function formatCount(count: number, singular: string, plural = singular + 's'): string {
  if (count === 0) return 'no ' + plural;
  return formatNumber(count, { decimals: 0 }) + NO_BREAK_SPACE + (count === 1 ? singular : plural);
}

/** A size of a file for people. */
export function formatBytes(bytes: number): string {
  const steps: [number, string][] = [
    [1e9, 'GB'],
    [1e6, 'MB'],
    [1e3, 'kB'],
  ];
  const step = steps.find(([size]) => bytes >= size);
  if (!step) return formatNumber(bytes, { decimals: 0, unit: 'B' });
  return formatNumber(bytes / step[0], { significantDigits: 3, unit: step[1] });
}

/** A whole number in words up to twelve, as sentences want it: `seven of twelve readings`. */
export function countInWords(count: number): string {
  const words = [
    'none',
    'one',
    'two',
    'three',
    'four',
    'five',
    'six',
    'seven',
    'eight',
    'nine',
    'ten',
    'eleven',
    'twelve',
  ];
  return words[count] ?? formatNumber(count, { decimals: 0 });
}

function decimalText(magnitude: number, { decimals, significantDigits }: FormatNumberOptions): string {
  if (decimals !== undefined) return roundToPlace(magnitude, decimals).toFixed(decimals);
  if (significantDigits !== undefined && magnitude > 0) {
    const [, exponent] = magnitude.toExponential(significantDigits - 1).split('e');
    const place = significantDigits - 1 - Number(exponent);
    return roundToPlace(magnitude, place).toFixed(Math.max(0, place));
  }
  const shortest = String(magnitude);
  // JavaScript switches to exponents at 1e21 and below 1e-6; neither belongs in running text.
  return shortest.includes('e') ? magnitude.toFixed(Math.min(20, exponentDecimals(shortest))) : shortest;
}

function exponentDecimals(text: string): number {
  const [mantissa = '', exponent = '0'] = text.split('e');
  return Math.max(0, (mantissa.split('.')[1]?.length ?? 0) - Number(exponent));
}

/**
 * Half away from zero on the decimal text, so that 1.005 becomes 1.01 as a person with a pencil would write it;
 * multiplying by 100 first would give 100.49999.
 */
function roundToPlace(value: number, place: number): number {
  const shifted = Math.round(Number(shiftExponent(Math.abs(value), place)));
  return Math.sign(value) * Number(shiftExponent(shifted, -place));
}

function shiftExponent(value: number, by: number): string {
  const [mantissa = '0', exponent = '0'] = String(value).split('e');
  return `${mantissa}e${Number(exponent) + by}`;
}

function groupDigits(plain: string): string {
  const [whole = '', fraction] = plain.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, GROUP_SEPARATOR);
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}

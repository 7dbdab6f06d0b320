import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatConductivity,
  formatCount,
  formatNumber,
  formatProbability,
  formatSigned,
  formatWithUncertainty,
  parseDecimal,
  uncertaintyPlace,
} from '../../shared/format/numbers.ts';

const thin = '\u2009';
const hard = '\u00a0';
const minus = '\u2212';

describe('a number in text', () => {
  it('groups digits from a thousand on with a thin space', () => {
    expect(formatNumber(999.5, { decimals: 1 })).toBe('999.5');
    expect(formatNumber(1078.5, { decimals: 1 })).toBe(`1${thin}078.5`);
    expect(formatNumber(1234567, { decimals: 0 })).toBe(`1${thin}234${thin}567`);
  });

  it('does not group digits after the point', () => {
    expect(formatNumber(0.12345)).toBe('0.12345');
  });

  it('carries a true minus and never a negative zero', () => {
    expect(formatNumber(-2.14, { decimals: 2 })).toBe(`${minus}2.14`);
    expect(formatNumber(-0.004, { decimals: 2 })).toBe('0.00');
    expect(formatSigned(-0.004, 2)).toBe('0.00');
    expect(formatSigned(0.4, 1, '%')).toBe(`+0.4${hard}%`);
  });

  it('rounds halves as a person with a pencil does, not as binary fractions fall', () => {
    expect(formatNumber(1.005, { decimals: 2 })).toBe('1.01');
    expect(formatNumber(2.675, { decimals: 2 })).toBe('2.68');
    expect(formatNumber(-1.005, { decimals: 2 })).toBe(`${minus}1.01`);
  });

  it('keeps significant digits, also when rounding carries', () => {
    expect(formatNumber(0.0123456, { significantDigits: 3 })).toBe('0.0123');
    expect(formatNumber(9.996, { significantDigits: 3 })).toBe('10.0');
    expect(formatNumber(123456, { significantDigits: 2 })).toBe(`120${thin}000`);
  });

  it('never falls into exponents', () => {
    expect(formatNumber(1.5e-7)).toBe('0.00000015');
  });

  it('prints a dash where there is no value', () => {
    expect(formatNumber(null)).toBe('–');
    expect(formatNumber(Number.NaN, { unit: '%' })).toBe('–');
  });
});

describe('a value with its uncertainty', () => {
  it.each([
    [51.23, 1.32, '51.2', '1.3'],
    [49.8213, 0.447, '49.82', '0.45'],
    [404.7, 17.2, '405', '17'],
    [1.2345, 0.0996, '1.23', '0.10'],
    [0.51184, 0.00213, '0.5118', '0.0021'],
    [12_345, 170, `12${thin}350`, '170'],
    [1413.2, 9.96, '1\u2009413', '10'],
  ])('%f with U %f is printed as %s ± %s', (value, U, figure, uncertainty) => {
    const printed = formatWithUncertainty({ value, expandedUncertainty: U, unit: 'µS/cm' });
    expect([printed.value, printed.uncertainty]).toEqual([figure, uncertainty]);
    expect(printed.text).toBe(`${figure}${hard}±${hard}${uncertainty}${hard}µS/cm`);
  });

  it('prints no U where it cannot be known', () => {
    const printed = formatWithUncertainty({ value: 233.12, unit: 'µS/cm', decimalsWithoutUncertainty: 1 });
    expect(printed).toMatchObject({ value: '233.1', uncertainty: null, text: `233.1${hard}µS/cm` });
  });

  it('gives value and U the same last digit, whatever they are', () => {
    const value = fc.double({ min: -1e5, max: 1e5, noNaN: true });
    const uncertainty = fc.double({ min: 1e-4, max: 1e4, noNaN: true });
    fc.assert(
      fc.property(value, uncertainty, (v, U) => {
        const printed = formatWithUncertainty({ value: v, expandedUncertainty: U, unit: '' });
        const decimals = (text: string) => text.split('.')[1]?.length ?? 0;
        expect(decimals(printed.value)).toBe(decimals(printed.uncertainty ?? ''));
        const read = parseDecimal(printed.uncertainty ?? '') ?? 0;
        // Half of the second digit is the most that rounding to two digits may move U.
        expect(Math.abs(read - U)).toBeLessThanOrEqual(0.5 * 10 ** -uncertaintyPlace(U) * (1 + 1e-9));
      }),
    );
  });

  it('writes conductivity in mS/cm from 10 000 µS/cm on, unless the point says otherwise', () => {
    expect(formatConductivity({ conductivityUsCm: 49_821, expandedUncertaintyUsCm: 447 }).text).toBe(
      `49.82${hard}±${hard}0.45${hard}mS/cm`,
    );
    expect(formatConductivity({ conductivityUsCm: 9_980, expandedUncertaintyUsCm: 90 }).unit).toBe('µS/cm');
    expect(
      formatConductivity({ conductivityUsCm: 2_140, expandedUncertaintyUsCm: 20, unit: 'mS/cm' }).value,
    ).toBe('2.140');
  });
});

describe('a probability', () => {
  it('is never certain', () => {
    expect(formatProbability(1)).toBe(`>${hard}99${hard}%`);
    expect(formatProbability(0)).toBe(`<${hard}1${hard}%`);
  });

  it('does not reach a policy by rounding', () => {
    expect(formatProbability(0.896)).toBe(`89${hard}%`);
    expect(formatProbability(0.9)).toBe(`90${hard}%`);
    expect(formatProbability(0.29)).toBe(`29${hard}%`);
  });
});

describe('a number that a person typed', () => {
  it.each([
    ['0,5118', 0.5118],
    ['1 408.2', 1408.2],
    [`1${thin}408,2`, 1408.2],
    [`${minus}1.5`, -1.5],
    ['.5', 0.5],
    ['12.', 12],
    ['1e3', 1000],
  ])('%s is read', (text, value) => {
    expect(parseDecimal(text)).toBe(value);
  });

  it.each(['', 'abc', '1.2.3', '1,234.5', '--1', 'Infinity'])('%s is refused', (text) => {
    expect(parseDecimal(text)).toBeNull();
  });

  it('reads back whatever is printed', () => {
    fc.assert(
      fc.property(fc.integer({ min: -10_000_000, max: 10_000_000 }), (n) => {
        expect(parseDecimal(formatNumber(n / 1000, { decimals: 3 }))).toBe(n / 1000 + 0);
      }),
    );
  });
});

it('counts things with their noun', () => {
  expect(formatCount(0, 'probe')).toBe('no probes');
  expect(formatCount(1, 'probe')).toBe(`1${hard}probe`);
  expect(formatCount(2, 'entry', 'entries')).toBe(`2${hard}entries`);
});

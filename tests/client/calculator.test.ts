import { describe, expect, it } from 'vitest';
import { CALCULATORS } from '../../client/src/features/calculations/calculators.ts';
import {
  figureText,
  initialValues,
  missingFields,
  missingWords,
  plannedStrip,
  shownFields,
  uncertaintyWords,
} from '../../client/src/features/calculations/model.ts';
import * as contracts from '../../shared/contracts/calculations.ts';

const calculator = (kind: string) => CALCULATORS.find((one) => one.kind === kind)!;
const nothing = () => '';

const schemas = {
  standard: contracts.standardConductivity,
  dilute: contracts.diluteKcl,
  reference: contracts.referenceValue,
  units: contracts.unitConversion,
  concentration: contracts.concentrationConversion,
  'cell-constant': contracts.cellConstantFromReading,
  plan: contracts.plannedComparison,
} as const;

it.each(Object.entries(schemas))('asks the server for %s in the words of the contract', (kind, schema) => {
  const { fields, body } = calculator(kind);
  const values = { ...initialValues(fields, nothing) };
  for (const field of missingFields(fields, values)) values[field.name] = '20';
  expect(schema.safeParse(body(values)).success).toBe(true);
});

it('offers a lot or a basis, never the fields of both', () => {
  const { fields, body } = calculator('standard');
  const values = { ...initialValues(fields, nothing), by: 'lot', standardId: '7' };
  expect(shownFields(fields, values).map((field) => field.name)).toEqual([
    'by',
    'standardId',
    'temperatureC',
  ]);
  expect(body(values)).toEqual({ solution: { by: 'lot', standardId: 7 }, temperatureC: 25 });
});

it('takes up what the address gives', () => {
  const { fields } = calculator('reference');
  const values = initialValues(fields, (name) => (name === 'conductivityUsCm' ? '450' : ''));
  expect(values).toMatchObject({ conductivityUsCm: '450', temperatureC: '', referenceC: '25' });
});

it('says what is still missing, a number that is none included', () => {
  const { fields } = calculator('reference');
  const values = { ...initialValues(fields, nothing), conductivityUsCm: 'NaN' };
  const missing = missingFields(fields, values);
  expect(missing.map((field) => field.name)).toEqual(['conductivityUsCm', 'temperatureC']);
  expect(missingWords(missing)).toBe(
    'Fill in “Measured conductivity” and “at” with a number, and the result stands here.',
  );
});

describe('a figure', () => {
  it('is rounded to its U', () => {
    const given = { value: 1408.2312, unit: 'µS/cm', expandedUncertainty: 0.8449 };
    expect(figureText(given)).toMatchObject({ value: '1\u2009408.23', uncertainty: '0.84' });
  });

  it('without a U of its own keeps six digits and no idle zeros', () => {
    expect(figureText({ value: 0.1, unit: 'S/m', expandedUncertainty: null }).value).toBe('0.1');
    expect(figureText({ value: 609.7541, unit: 'µS/cm', expandedUncertainty: null }).value).toBe('609.754');
    expect(figureText({ value: 1000, unit: 'Ω·cm', expandedUncertainty: null }).value).toBe('1\u2009000');
  });

  it('says what its U is, or whose', () => {
    expect(uncertaintyWords({ expandedUncertainty: 0.8, coverageFactor: 2 })).toBe('U with k = 2.0');
    expect(uncertaintyWords({ expandedUncertainty: null, coverageFactor: null })).toBe(
      'U is that of what you put in',
    );
  });
});

it('draws a plan as the strip of a probe that reads exactly right', () => {
  const answer = {
    canDecide: false,
    sentence: '',
    referenceUsCm: 84,
    expandedUncertaintyPercent: 3.2,
    coverageFactor: 2,
    acceptanceLimitPercent: -0.2,
    toleranceToUncertainty: 0.94,
    probabilityOutsideAtLimit: 0.02,
    source: '',
    budget: [],
  };
  expect(plannedStrip(answer, 3)).toMatchObject({ error: 0, guardBand: 3.2, outcome: 'within-unsure' });
});

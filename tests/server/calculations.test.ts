import { afterAll, beforeAll, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

const ask = async (path: string, body: object) =>
  (await (await app.as('technician')).post(`/api/calculations/${path}`).send(body).expect(200)).body;
const basis = { by: 'basis', basis: 'molal', nominal: 0.01 };

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['post', '/api/calculations/units', { value: 1, unit: 'uS/cm' }],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a table that ends',
      who: 'technician',
      ask: () => ['post', '/api/calculations/standard-conductivity', { solution: basis, temperatureC: 51 }],
      code: 'reference.outside-domain',
      status: 422,
    },
    {
      says: 'an unknown lot',
      who: 'technician',
      ask: () => [
        'post',
        '/api/calculations/standard-conductivity',
        { solution: { by: 'lot', standardId: 4711 }, temperatureC: 25 },
      ],
      code: 'standards.not-found',
      status: 404,
    },
    {
      says: 'a nominal value without a table',
      who: 'technician',
      ask: () => [
        'post',
        '/api/calculations/standard-conductivity',
        { solution: { ...basis, nominal: 0.02 }, temperatureC: 25 },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'solution.nominal',
    },
  ],
);

// Pratt et al., Pure Appl. Chem. 73 (2001) 1783: 0.01 mol/kg at 25 °C, 1408.23 µS/cm (published).
it('a standard comes with its value, U, k, equation, range and source', async () => {
  const { figures } = await ask('standard-conductivity', { solution: basis, temperatureC: 25 });
  expect(figures[0]).toMatchObject({ value: 1408.23, unit: 'µS/cm', coverageFactor: 2, range: '0 to 50 °C' });
  expect(figures[0].expandedUncertainty / figures[0].value).toBeCloseTo(0.0006, 4);
  expect(figures[0].source).toMatch(/2001/);
});

it('the limiting law stands beside the dilute equation, and its refusal is said, not hidden', async () => {
  const low = await ask('dilute-kcl', { concentrationMolL: 0.0005, temperatureC: 25, solventUsCm: 0.9 });
  expect(low.figures).toHaveLength(2);
  expect(low.figures[0].value).toBeCloseTo(low.figures[1].value, 0);
  const high = await ask('dilute-kcl', { concentrationMolL: 0.008, temperatureC: 25, solventUsCm: 0 });
  expect(high.figures).toHaveLength(1);
  expect(high.refusals).toMatchObject([{ name: 'Limiting law' }]);
});

it('every model is side by side; those that do not apply say why', async () => {
  const answer = await ask('reference-temperature', { conductivityUsCm: 500, temperatureC: 10 });
  expect(answer.figures).toHaveLength(3);
  expect(answer.refusals).toHaveLength(1);
  expect(answer.refusals[0].why).toMatch(/ultrapure/);
});

// Traditional slip: 1 mS/m is 10 µS/cm, not 1000 (SI).
it('141.3 mS/m is 1413 µS/cm', async () => {
  const { figures } = await ask('units', { value: 141.3, unit: 'mS/m' });
  expect(figures[0]).toMatchObject({ unit: 'µS/cm' });
  expect(figures[0].value).toBeCloseTo(1413, 9);
});

it('a plan says whether it can decide, and what to make smaller when it cannot', async () => {
  const plan = {
    solution: basis,
    temperatureC: 25,
    temperatureStandardUncertaintyC: 0.05,
    repeatabilityPercent: 0.1,
    tolerancePercent: 2,
    rule: 'guarded-u',
  };
  expect(await ask('planned-comparison', plan)).toMatchObject({
    canDecide: true,
    source: expect.stringMatching(/2001/) as string,
  });
  const coarse = await ask('planned-comparison', { ...plan, temperatureStandardUncertaintyC: 1 });
  expect(coarse.canDecide).toBe(false);
  expect(coarse.sentence).toMatch(/largest part of U is the temperature/);
});

/** How long one check reading takes to evaluate, as ingest does it. */
import { settingDefaults } from '../../shared/contracts/settings.ts';
import { evaluate, type CheckCircumstances } from '../../server/ingest/evaluate.ts';

const circumstances: CheckCircumstances = {
  reading: {
    n: 1,
    atMs: Date.parse('2026-12-01T12:00:00Z'),
    context: 'check',
    conductivityUsCm: 1350,
    temperatureC: 22.4,
    conductanceUs: null,
    solution: 'LOT-1',
    quality: 'good',
    flags: [],
    extraJson: null,
  },
  lot: {
    id: 1,
    code: 'LOT-1',
    medium: 'kcl-aqueous',
    basis: 'molal',
    nominal: 0.01,
    certifiedConductivityUsCm: 1409,
    referenceTemperatureC: 25,
    expandedUncertaintyUsCm: 2.8,
    coverageFactor: 2,
    temperatureTable: null,
    expiresOn: '2027-12-31',
    state: 'released',
  },
  point: {
    pointId: 1,
    siteId: 1,
    compensationModel: 'linear',
    compensationCoefficientPercentPerK: 2,
    referenceTemperatureC: 25,
    tolerancePercent: 3,
    decisionRule: 'guarded-u',
  },
  probe: { resolutionUsCm: 0.1 },
  cellConstantPerCm: 1,
  uncertainty: settingDefaults['check-uncertainty'],
};

export function measureCheckEvaluation(turns = 20_000): number {
  const run = (count: number): void => {
    for (let i = 0; i < count; i += 1) {
      const result = evaluate(circumstances);
      if (!result.isValid) throw new Error(`The check of the benchmark does not count: ${result.reason}.`);
    }
  };
  run(2000);
  const started = performance.now();
  run(turns);
  return ((performance.now() - started) * 1000) / turns;
}

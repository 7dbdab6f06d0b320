import type { MqttClient } from 'mqtt';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { kclStandardConductivity } from '../../shared/science/kcl-standards.ts';
import type { Standard } from '../../server/db/models/index.ts';
import { aStandard } from '../support/rows.ts';
import { aBirth, aMessage, aReading, at, publish, startPlant, type Plant, type Station } from './plant.ts';

let plant: Plant;
let station: Station;
let client: MqttClient;
let lot: Standard;

beforeAll(async () => {
  plant = await startPlant();
});
afterAll(() => plant.stop());
beforeEach(async () => {
  plant.events.length = 0;
  station = await plant.station({ point: { tolerancePercent: 3, decisionRule: 'guarded-u' } });
  client = await plant.connect(station);
  lot = await aStandard();
});

const checksOf = (of: Station) =>
  plant.rows<Record<string, unknown>>('select * from checks where probe_id = $1 order by n', [of.probe.id]);
/** KCl 0.01 mol/kg as the lot's basis has it. */
const trueAt = (temperatureC: number): number =>
  kclStandardConductivity({ basis: 'molal', nominal: 0.01, temperatureC }).conductivityUsCm;
const inKcl = (n: number, more: Record<string, unknown> = {}): Record<string, unknown> =>
  aReading(n, {
    context: 'check',
    solution: lot.code,
    temperature_c: 22,
    conductivity_us_cm: trueAt(22) * 1.02,
    ...more,
  });
const check = (reading: Record<string, unknown>, more: Record<string, unknown> = {}): Promise<void> =>
  publish(client, station.name, 'readings', aMessage([reading], more));

describe('a check in a released lot', () => {
  it('is compared with what the lot conducts at that temperature', async () => {
    await check(inKcl(1));
    const [row] = await checksOf(station);
    expect(row).toMatchObject({
      stage: 'automatic',
      is_valid: true,
      invalid_reason: null,
      solution: lot.code,
      standard_id: lot.id,
      point_id: station.point.id,
      n: 1,
      tolerance_percent: 3,
      decision_rule: 'guarded-u',
      outcome: 'within-clear',
    });
    expect(row?.reference_us_cm).toBeCloseTo(trueAt(22), 9);
    expect(row?.error_percent).toBeCloseTo(2, 9);
    expect(row?.implied_cell_constant_per_cm).toBeCloseTo(1 / 1.02, 9);
    expect(row?.acceptance_limit_percent).toBeCloseTo(3 - (row?.expanded_uncertainty_percent as number), 9);
    expect((row?.budget as { name: string }[]).map(({ name }) => name)).toContain('lot value');
    expect(plant.events).toContainEqual({
      slice: 'checks',
      id: row?.id,
      kind: 'created',
      siteId: station.site.id,
    });
  });

  it.each<[number, string]>([
    [0.2, 'within-clear'],
    [2.8, 'within-unsure'],
    [3.2, 'outside-unsure'],
    [9.7, 'outside-clear'],
  ])('an error of %f percent is %s', async (errorPercent, outcome) => {
    await check(inKcl(1, { conductivity_us_cm: trueAt(22) * (1 + errorPercent / 100) }));
    expect(await checksOf(station)).toMatchObject([{ outcome }]);
  });

  it('is evaluated once, however often it is sent', async () => {
    await check(inKcl(1));
    await check(inKcl(1));
    expect(await checksOf(station)).toHaveLength(1);
  });

  it('uses the cell constant of the settings the device had', async () => {
    await publish(client, station.name, 'birth', aBirth(station, { cell_constant_per_cm: 1.01 }), true);
    await publish(
      client,
      station.name,
      'birth',
      aBirth(station, { cell_constant_per_cm: 1.02, settings: 'sha256:later00' }),
      true,
    );
    await check(inKcl(1), { settings: 'sha256:9b1c4e00' });
    await check(inKcl(2), { settings: 'sha256:later00' });
    await check(inKcl(3));
    expect((await checksOf(station)).map((row) => row.cell_constant_per_cm)).toEqual([1.01, 1.02, 1.02]);
  });

  it('that comes late counts for the point where the probe stood then', async () => {
    await publish(client, station.name, 'late', aMessage([inKcl(1, { at: at(-3 * 86_400) })]));
    expect(await checksOf(station)).toMatchObject([
      { is_valid: true, point_id: station.point.id, at: new Date(at(-3 * 86_400)) },
    ]);
  });

  it('follows a change of the point at once', async () => {
    await check(inKcl(1));
    await station.point.update({ tolerancePercent: 10 });
    await check(inKcl(2));
    expect((await checksOf(station)).map((row) => row.tolerance_percent)).toEqual([3, 10]);
  });
});

describe('what cannot count is kept with its reason and has no result', () => {
  it.each<[string, () => Promise<Record<string, unknown>>]>([
    ['solution-missing', async () => inKcl(1, { solution: null })],
    ['solution-unknown', async () => inKcl(1, { solution: 'NO-SUCH-LOT' })],
    [
      'solution-expired',
      async () => inKcl(1, { solution: (await aStandard({ expiresOn: '2026-11-30' })).code }),
    ],
    [
      'solution-quarantined',
      async () => inKcl(1, { solution: (await aStandard({ state: 'quarantined' })).code }),
    ],
    ['solution-recalled', async () => inKcl(1, { solution: (await aStandard({ state: 'recalled' })).code })],
    ['no-temperature', async () => inKcl(1, { temperature_c: null })],
    ['no-temperature', async () => inKcl(1, { flags: ['t_open'] })],
    ['no-conductivity', async () => inKcl(1, { conductivity_us_cm: null })],
    ['no-conductivity', async () => inKcl(1, { conductivity_us_cm: 0 })],
    ['quality-not-good', async () => inKcl(1, { quality: 'doubtful' })],
    ['quality-not-good', async () => inKcl(1, { flags: ['hold'] })],
    ['outside-solution-range', async () => inKcl(1, { temperature_c: 70 })],
  ])('%s', async (reason, reading) => {
    await check(await reading());
    const [row] = await checksOf(station);
    expect(row).toMatchObject({
      is_valid: false,
      invalid_reason: reason,
      outcome: null,
      error_percent: null,
    });
    expect(plant.events).toContainEqual(expect.objectContaining({ slice: 'checks', id: row?.id }));
  });

  it('a lot counts through its last day', async () => {
    const last = await aStandard({ expiresOn: '2026-12-01' });
    await check(inKcl(1, { solution: last.code }));
    expect(await checksOf(station)).toMatchObject([{ is_valid: true }]);
  });

  it('a recall counts from the moment it is committed', async () => {
    await check(inKcl(1));
    await lot.update({ state: 'recalled', stateReason: 'Producer recalled it.' });
    await check(inKcl(2));
    expect((await checksOf(station)).map((row) => row.invalid_reason)).toEqual([null, 'solution-recalled']);
  });

  it('a probe that stands nowhere has no requirement to meet', async () => {
    await plant.rows('update assignments set to_at = $2 where probe_id = $1', [station.probe.id, at(-3600)]);
    await check(inKcl(1));
    expect(await checksOf(station)).toMatchObject([{ invalid_reason: 'not-installed', point_id: null }]);
  });
});

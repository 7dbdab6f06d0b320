import { describe, expect, it } from 'vitest';
import { kclStandardConductivity } from '../../shared/science/kcl-standards.ts';
import { benchSurroundings, solutionConductivity, type ReferenceSolution } from '../../simulator/bench.ts';
import {
  advanceProbe,
  cleanProbe,
  damageProbe,
  effectiveCellConstant,
  newProbeState,
  observe,
  trueCellConstant,
  trueRelativeError,
} from '../../simulator/probe.ts';
import { genericProbe } from '../../simulator/generic-profile.ts';
import { seedFor } from '../../simulator/random.ts';
import { processWater, processWaters } from '../../simulator/scenario/process-waters.ts';
import { flowOf } from '../../simulator/waters.ts';

const start = Date.UTC(2026, 0, 5);
const day = 86_400_000;
const kcl: ReferenceSolution = {
  code: 'BENCH-1',
  basis: 'molal',
  nominal: 0.01,
  certified25UsCm: null,
  table: null,
  deviation: 0,
};

function quietProbe(device = 'probe-test-1') {
  const { profile } = genericProbe(device, 1, start);
  return {
    ...profile,
    kind: 'four-electrode' as const,
    newCellConstantPerCm: 0.5,
    noise: { relative: 0, absoluteUsCm: 0 },
    temperature: { offsetC: 0, noiseC: 0, responseS: 15 },
    leakageUs: 0,
    rangeHighUsCm: 200_000,
    resolutionUsCm: 0.01,
  };
}

describe('the physical probe', () => {
  it('shows raw conductivity = conductance × the cell constant in use', () => {
    const { profile, state } = genericProbe('probe-raw-1', 3, start);
    for (let minute = 0; minute < 200; minute += 1) {
      const at = start + minute * 60_000;
      const seen = observe(profile, state, { conductivityUsCm: 612, temperatureC: 13, inPlace: true }, at, 9);
      expect(seen.conductanceUs * state.cellConstantInUsePerCm).toBeCloseTo(seen.conductivityUsCm, 3);
    }
  });

  it('lives the same life however often it is asked', () => {
    const profile = quietProbe();
    const often = Array.from({ length: 900 }, (_, index) => start + index * 0.1 * day).reduce(
      (state, at) => advanceProbe(profile, state, at, 7),
      newProbeState(profile, start),
    );
    const once = advanceProbe(profile, newProbeState(profile, start), start + 89.9 * day, 7);
    expect(often.lnAgeing).toBe(once.lnAgeing);
    expect(often.deposit).toBe(once.deposit);
    expect(advanceProbe(profile, newProbeState(profile, start), start + 89.9 * day, 8).lnAgeing).not.toBe(
      once.lnAgeing,
    );
  });

  it('drifts at its rate and fouls up to its ceiling; cleaning takes the deposit and leaves the drift', () => {
    const profile = {
      ...quietProbe(),
      ageing: { perDay: 1e-4, walkPerRootDay: 0 },
      fouling: { perDay: 2e-4, ceiling: 0.01 },
    };
    const aged = advanceProbe(profile, newProbeState(profile, start), start + 300 * day, 7);
    expect(trueCellConstant(profile, aged)).toBeCloseTo(0.5 * Math.exp(0.03), 6);
    expect(aged.deposit).toBeGreaterThan(0.009);
    expect(aged.deposit).toBeLessThanOrEqual(0.01);
    const cleaned = cleanProbe(profile, aged, 7);
    expect(cleaned.deposit).toBeLessThan(0.06 * aged.deposit);
    expect(trueCellConstant(profile, cleaned)).toBe(trueCellConstant(profile, aged));
    // A grown cell constant and a deposit both make it read low.
    expect(trueRelativeError(profile, aged)).toBeCloseTo((1 - aged.deposit) / Math.exp(0.03) - 1, 9);
  });

  it('recovers its true cell constant from a check in potassium chloride', () => {
    const profile = quietProbe();
    const aged = damageProbe(
      advanceProbe(profile, newProbeState(profile, start), start + 200 * day, 7),
      0.043,
    );
    const temperatureC = 18.4;
    const reference = kclStandardConductivity({
      basis: 'molal',
      nominal: 0.01,
      temperatureC,
    }).conductivityUsCm;
    const seen = observe(
      profile,
      aged,
      { conductivityUsCm: reference, temperatureC, inPlace: false },
      start,
      7,
    );
    const implied = (aged.cellConstantInUsePerCm * reference) / seen.conductivityUsCm;
    // Resolution 0.01 in 1200 µS/cm: half a step is 4e-6 of the value.
    expect(implied / effectiveCellConstant(profile, aged)).toBeCloseTo(1, 5);
  });

  it('settles in a bottle: far off at first, within 0.3 % and 0.05 °C after ten time constants', () => {
    const profile = quietProbe();
    const state = newProbeState(profile, start);
    const immersion = { solution: kcl, temperatureC: 22, startedAt: start, fromTemperatureC: 11 };
    const at = (seconds: number) => benchSurroundings(profile, immersion, start + seconds * 1000, 5);
    expect(Math.abs(at(2).temperatureC - 22)).toBeGreaterThan(5);
    const settled = at(300);
    expect(Math.abs(settled.temperatureC - 22)).toBeLessThan(0.05);
    const reference = solutionConductivity(kcl, settled.temperatureC);
    const seen = observe(profile, state, settled, start + 300_000, 5);
    expect(Math.abs(seen.conductivityUsCm / reference - 1)).toBeLessThan(0.003);
  });

  it('feels its leads in strong solution when it has two electrodes, and not when it has four', () => {
    const four = quietProbe();
    const two = { ...four, kind: 'two-electrode' as const, seriesResistanceOhm: 0.5 };
    const state = newProbeState(four, start);
    const around = { conductivityUsCm: 12_850, temperatureC: 25, inPlace: false };
    const error = (profile: typeof two | typeof four) =>
      observe(profile, state, around, start, 5).conductivityUsCm / around.conductivityUsCm - 1;
    expect(error(four)).toBeCloseTo(0, 5);
    // G = 25 700 µS; 0.5 Ω in series takes G·Rs/(1 + G·Rs) = 1.27 %.
    expect(error(two)).toBeCloseTo(-0.01269, 4);
  });

  it('says when the range ends', () => {
    const profile = { ...quietProbe(), rangeHighUsCm: 2000 };
    const seen = observe(
      profile,
      newProbeState(profile, start),
      { conductivityUsCm: 2600, temperatureC: 20, inPlace: true },
      start,
      5,
    );
    expect(seen).toMatchObject({ flags: ['over'], quality: 'bad', conductivityUsCm: 2000 });
  });
});

describe('the process waters', () => {
  it('flow the same for the same seed, another way for another', () => {
    const water = processWater('feed-a');
    expect(flowOf(water, 4)(start)).toEqual(flowOf(water, 4)(start));
    expect(flowOf(water, 4)(start)).not.toEqual(flowOf(water, 5)(start));
  });

  it('are colder in February than in August, and conduct less then', () => {
    const flow = flowOf(processWater('permeate-all'), 4);
    const february = flow(Date.UTC(2026, 1, 10, 12));
    const august = flow(Date.UTC(2026, 7, 10, 12));
    expect(august.temperatureC - february.temperatureC).toBeGreaterThan(4);
    expect(february.conductivityUsCm).toBeLessThan(february.conductivity25UsCm);
  });

  it('stay in their own decade for a year', () => {
    const band: Record<string, [number, number]> = {
      'feed-a': [48_000, 55_000],
      'permeate-a': [250, 450],
      'after-lime': [500, 700],
      'condensate-a': [1, 20],
      'blowdown-1': [2_000, 4_000],
    };
    for (const [key, [low, high]] of Object.entries(band)) {
      const flow = flowOf(processWater(key), 20_260);
      for (let at = start; at < start + 365 * day; at += 7 * 3_600_000) {
        const { conductivity25UsCm } = flow(at);
        expect(conductivity25UsCm, key).toBeGreaterThan(low);
        expect(conductivity25UsCm, key).toBeLessThan(high);
      }
    }
  });

  it('run through caustic, acid and rinse in a cleaning', () => {
    const flow = flowOf(processWater('return-1'), 1);
    const seen = Array.from({ length: 480 }, (_, minute) => flow(start + minute * 60_000));
    expect(Math.max(...seen.map((one) => one.conductivity25UsCm))).toBeGreaterThan(45_000);
    expect(Math.max(...seen.map((one) => one.temperatureC))).toBeGreaterThan(70);
    expect(
      seen.some(
        (one) => one.conductivity25UsCm > 30_000 && one.conductivity25UsCm < 37_000 && one.temperatureC < 66,
      ),
    ).toBe(true);
    expect(Math.min(...seen.map((one) => one.conductivity25UsCm))).toBeLessThan(700);
  });

  it('have keys of their own', () => {
    expect(new Set(processWaters.map(({ key }) => key)).size).toBe(processWaters.length);
    expect(seedFor(1, 'pond-1')).not.toBe(seedFor(1, 'pond-2'));
  });
});

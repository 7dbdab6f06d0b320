/**
 * Runs against a probe whose true cell constant is known: a simulated cell in a simulated beaker, judged by the product's
 * own arithmetic. What nobody at the bench can know (the lot's deviation from its certificate, the thermometer's bias,
 * the gradient, an opened bottle) is drawn for every run from what its budget row claims, so that a U that is honest
 * covers about 95 % of runs: fewer would be a U too small, all of them one too wide to be of use.
 */
import { expect, it } from 'vitest';
import { judgeRun, type JudgeInput } from '../../server/features/calibrations/judge.ts';
import type { CountingReading } from '../../server/features/calibrations/budget.ts';
import type { CaptureStep, RunStep } from '../../shared/contracts/vocabulary.ts';
import type { CertifiedLot } from '../../shared/science/certified-lots.ts';
import { benchSurroundings, type Immersion, type ReferenceSolution } from '../../simulator/bench.ts';
import {
  advanceProbe,
  cleanProbe,
  effectiveCellConstant,
  newProbeState,
  observe,
  type ProbeProfile,
  type ProbeState,
} from '../../simulator/probe.ts';
import { normalAt, uniformAt } from '../../simulator/random.ts';

const runs = 300;
const minuteMs = 60_000;
const dayMs = 86_400_000;
const visitAt = Date.parse('2026-12-01T12:00:00.000Z');
const thermometer = { standardUncertaintyC: 0.015, correctionC: 0 };
const temperatureRangeC = 0.1;

const certified: CertifiedLot = {
  medium: 'kcl-aqueous',
  basis: 'molal',
  nominal: 0.01,
  certifiedConductivityUsCm: 1408.2,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: 3.5,
  coverageFactor: 2,
  temperatureTable: null,
};

const profileOf = (run: number): ProbeProfile => ({
  device: `bench-${run}`,
  serial: `4E-${run}`,
  kind: 'four-electrode',
  firmware: '1',
  newCellConstantPerCm: 1 + 0.01 * normalAt(11, run),
  rangeLowUsCm: 0,
  rangeHighUsCm: 20_000,
  resolutionUsCm: 0.1,
  intervalS: 5,
  compensation: { model: 'none', coefficientPercentPerK: null, referenceC: null },
  water: 'none',
  ageing: { perDay: 5e-5, walkPerRootDay: 8e-4 },
  fouling: { perDay: 4e-4, ceiling: 0.05 },
  noise: { relative: 4e-4, absoluteUsCm: 0.05 },
  temperature: { offsetC: 0.05 * normalAt(12, run), noiseC: 0.01, responseS: 20 },
  seriesResistanceOhm: 0,
  leakageUs: 0.02,
  installationFactor: 1,
  check: null,
});

const symmetric = (seed: number, run: number, halfWidth: number): number =>
  halfWidth * (2 * uniformAt(seed, run) - 1);

/** What is truly in the beaker: the certificate's own uncertainty, an opened bottle (0.2 %), carbon dioxide (0.55 µS/cm). */
const solutionOf = (run: number): ReferenceSolution => ({
  code: 'KC-BENCH',
  basis: 'molal',
  nominal: 0.01,
  certified25UsCm: 1408.2,
  table: null,
  deviation:
    (1.75 / 1408.2) * normalAt(13, run) + symmetric(14, run, 0.002) + symmetric(15, run, 0.55) / 1408.2,
});

function captureState(run: number, state: ProbeState, startedAt: number): CountingReading[] {
  const profile = profileOf(run);
  const immersion: Immersion = {
    solution: solutionOf(run),
    temperatureC: 19 + 4 * uniformAt(16, run),
    startedAt,
    fromTemperatureC: 13,
  };
  const gradientC = symmetric(17, startedAt + run, temperatureRangeC);
  const biasC = thermometer.standardUncertaintyC * normalAt(18, run);
  return [8, 9, 10, 11, 12].map((minutes) => {
    const at = startedAt + minutes * minuteMs;
    const around = benchSurroundings(profile, immersion, at, 900 + run);
    const shown = observe(profile, state, around, at, 900 + run);
    return {
      conductivityUsCm: shown.conductivityUsCm,
      temperatureC: shown.temperatureC,
      referenceTemperatureC: around.temperatureC + gradientC + biasC,
      cellConstantPerCm: state.cellConstantInUsePerCm,
    };
  });
}

const asStep = (step: CaptureStep, readings: CountingReading[]) =>
  readings.map((reading) => ({ ...reading, step }));

function inputOf(run: number): JudgeInput {
  return {
    kind: 'four-electrode',
    resolutionUsCm: 0.1,
    nominalCellConstantPerCm: 1,
    tolerancePercent: 2,
    rule: 'guarded-u',
    criteria: {
      minReplicates: 3,
      stabilityWindowS: 60,
      stabilityRangePercent: 0.3,
      stabilitySlopePercentPerMin: 0.1,
      temperatureRangeC,
      stabilityTimeoutS: 600,
      repeatabilityLimitPercent: 0.3,
      adjustmentShareOfTolerance: 0.6667,
      openBeakerLimitUsCm: 50,
    },
    thermometer,
    probeTemperatureStandardUncertaintyC: 0.05,
    solution: { code: `KC-${run}`, lot: certified, isOpened: true },
    secondSolution: null,
    readings: [],
    finished: new Set(),
    decision: null,
    cellConstantAfterPerCm: null,
    lastVisit: null,
  };
}

/** One visit: a year of ageing and dirt, as found, cleaned, adjusted when the advice says so, as left. */
function visit(run: number) {
  const profile = profileOf(run);
  const born = newProbeState(profile, visitAt - 365 * dayMs);
  const dirty = advanceProbe(profile, born, visitAt, 5);
  const clean = cleanProbe(profile, dirty, 5);
  const input = inputOf(run);
  const readings = [
    ...asStep('as-found', captureState(run, dirty, visitAt)),
    ...asStep('as-found-cleaned', captureState(run, clean, visitAt + 20 * minuteMs)),
  ];
  const until: RunStep[] = ['as-found', 'as-found-cleaned'];
  const found = judgeRun({ ...input, readings, finished: new Set(until) });
  const decision = found.advice!.decision === 'adjust' ? 'adjust' : 'leave';
  const cellConstantAfterPerCm =
    decision === 'adjust' ? found.advice!.proposedCellConstantPerCm : clean.cellConstantInUsePerCm;
  const left = judgeRun({
    ...input,
    readings: [...readings, ...asStep('as-left', captureState(run, clean, visitAt + 40 * minuteMs))],
    finished: new Set([...until, 'decide', 'as-left']),
    decision,
    cellConstantAfterPerCm,
  });
  return { truePerCm: effectiveCellConstant(profile, clean), found, left, decision, cellConstantAfterPerCm };
}

const visits = Array.from({ length: runs }, (_, run) => visit(run));
const share = (covered: number): string => `${Math.round((1000 * covered) / runs) / 10} %`;

const recovered = visits.filter(({ truePerCm, found }) => {
  const { impliedCellConstantPerCm, expandedUncertaintyPercent } = found.cleaned!;
  return Math.abs(100 * (impliedCellConstantPerCm! / truePerCm - 1)) <= expandedUncertaintyPercent;
}).length;

const leftRight = visits.filter(({ truePerCm, left, cellConstantAfterPerCm }) => {
  const trueErrorPercent = 100 * (cellConstantAfterPerCm / truePerCm - 1);
  const { errorPercent, expandedUncertaintyPercent } = left.asLeft!;
  return Math.abs(errorPercent - trueErrorPercent) <= expandedUncertaintyPercent;
}).length;

it(`recovers the true cell constant within its U in ${recovered} of ${runs} runs (${share(recovered)})`, () => {
  expect(recovered).toBeGreaterThanOrEqual(0.93 * runs);
  expect(recovered).toBeLessThan(runs);
});

it(`states the error as left within its U in ${leftRight} of ${runs} runs (${share(leftRight)})`, () => {
  expect(leftRight).toBeGreaterThanOrEqual(0.93 * runs);
  expect(leftRight).toBeLessThan(runs);
});

it('adjusts some probes and leaves others, and never adjusts one that was truly right', () => {
  const adjusted = visits.filter(({ decision }) => decision === 'adjust');
  expect(adjusted.length).toBeGreaterThan(0);
  expect(adjusted.length).toBeLessThan(runs);
  for (const { truePerCm, found } of adjusted) {
    const trueErrorPercent = 100 * (found.cleaned!.cellConstantPerCm / truePerCm - 1);
    expect(Math.abs(trueErrorPercent)).toBeGreaterThan(found.cleaned!.expandedUncertaintyPercent);
  }
});

it('finds the dirt: fouling within its U of what the deposit did', () => {
  const covered = visits.filter(({ found }, run) => {
    const profile = profileOf(run);
    const dirty = advanceProbe(profile, newProbeState(profile, visitAt - 365 * dayMs), visitAt, 5);
    const clean = cleanProbe(profile, dirty, 5);
    const truth =
      100 *
      dirty.cellConstantInUsePerCm *
      (1 / effectiveCellConstant(profile, dirty) - 1 / effectiveCellConstant(profile, clean));
    const { changePercent, expandedUncertaintyPercent } = found.fouling!;
    return Math.abs(changePercent - truth) <= expandedUncertaintyPercent;
  }).length;
  expect(covered).toBeGreaterThanOrEqual(0.93 * runs);
});

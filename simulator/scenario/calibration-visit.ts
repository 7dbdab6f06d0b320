/** One visit of a technician with a bottle: as found, cleaned, adjusted or left, as left. */
import { certifiedConductivity, settledSurroundings } from '../bench.ts';
import {
  advanceProbe,
  cleanProbe,
  effectiveCellConstant,
  observe,
  roundCellConstant,
  roundTo,
  type ProbeProfile,
  type ProbeState,
} from '../probe.ts';
import { normalAt, seedFor, uniformAt } from '../random.ts';
import { lotInUse } from './lots.ts';
import { solutionOf } from './profiles.ts';
import type { CalibrationStage, LotSeed, PointSeed, ProbeSeed, PurposeReading } from './types.ts';

const MINUTE_MS = 60_000;
/** A good reference thermometer in a stirred beaker, standard deviation. */
const THERMOMETER_SD_C = 0.03;
/** Adjust only beyond two thirds of the tolerance: smaller corrections chase noise (common practice). */
const ADJUSTMENT_SHARE = 2 / 3;

export interface Replicate {
  at: number;
  n: number;
  conductivityUsCm: number;
  temperatureC: number;
  /** The reference thermometer in the same portion. */
  referenceTemperatureC: number;
}

export interface StageSeed {
  stage: CalibrationStage;
  lotCode: string;
  cellConstantPerCm: number;
  replicates: Replicate[];
}

export interface CalibrationSeed {
  key: string;
  probeKey: string;
  point: string;
  reason: 'installation' | 'interval' | 'suspicion';
  startedAt: number;
  signedAt: number;
  reviewedAt: number;
  performedBy: string;
  reviewedBy: string;
  cleaningAgent: string;
  thermometer: string;
  /** Order: as found, cleaned, as left (absent when not adjusted: as left equals cleaned). */
  stages: StageSeed[];
  /** The independent solution, after the decision, never adjusted to. */
  secondPoint: StageSeed;
  isAdjusted: boolean;
  cellConstantBeforePerCm: number;
  cellConstantAfterPerCm: number;
  /** True K with and without deposit at that moment; what the comparison should have recovered. Never loaded. */
  truth: { foundEffectivePerCm: number; cleanedEffectivePerCm: number };
}

export interface VisitRequest {
  probe: ProbeSeed;
  point: PointSeed;
  profile: ProbeProfile;
  lots: LotSeed[];
  seed: number;
  ownSeed: number;
  state: ProbeState;
  at: number;
  reason: CalibrationSeed['reason'];
  nextN: (at: number) => number;
}

interface Visit {
  calibration: CalibrationSeed;
  state: ProbeState;
  readings: PurposeReading[];
}

function mean(values: number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Room temperature of a bench beside the process. */
function benchTemperature(request: VisitRequest): number {
  const season = -Math.cos((2 * Math.PI * (request.at / 86_400_000 - 40)) / 365.2425);
  return 17.5 + 4 * season + 1.2 * normalAt(request.ownSeed ^ 0xbe, request.at);
}

function makeStage(
  request: VisitRequest,
  readings: PurposeReading[],
  options: {
    stage: CalibrationStage;
    lot: LotSeed;
    state: ProbeState;
    from: number;
    count: number;
    temperatureC: number;
  },
): StageSeed {
  const { stage, lot, state, from, count, temperatureC } = options;
  const replicates = Array.from({ length: count }, (_, index): Replicate => {
    const at = from + index * 70_000;
    const liquidC = temperatureC + 0.02 * normalAt(request.ownSeed ^ 0x31, at);
    const seen = observe(
      request.profile,
      state,
      settledSurroundings(solutionOf(lot), liquidC, at, request.ownSeed),
      at,
      request.ownSeed,
    );
    const n = request.nextN(at);
    readings.push({
      at,
      n,
      context: 'calibration',
      solution: lot.code,
      conductanceUs: seen.conductanceUs,
      conductivityUsCm: seen.conductivityUsCm,
      temperatureC: seen.temperatureC,
    });
    const referenceTemperatureC = roundTo(
      liquidC + THERMOMETER_SD_C * normalAt(request.ownSeed ^ 0x32, from),
      0.01,
    );
    return {
      at,
      n,
      conductivityUsCm: seen.conductivityUsCm,
      temperatureC: seen.temperatureC,
      referenceTemperatureC,
    };
  });
  return { stage, lotCode: lot.code, cellConstantPerCm: state.cellConstantInUsePerCm, replicates };
}

/** Error of a stage against its lot's certificate at the thermometer's temperature, as a share. */
export function stageError(stage: StageSeed, lot: LotSeed): number {
  return mean(
    stage.replicates.map(
      (one) => one.conductivityUsCm / certifiedConductivity(solutionOf(lot), one.referenceTemperatureC) - 1,
    ),
  );
}

function peopleOf(request: VisitRequest): { performedBy: string; reviewedBy: string } {
  const chance = uniformAt(seedFor(request.seed, request.probe.key), request.at);
  if (request.point.site === 'hollow-fen')
    return { performedBy: chance < 0.7 ? 'runa' : 'pell', reviewedBy: 'maud' };
  const reviewedBy = request.point.site === 'skerry-point' && chance > 0.8 ? 'maud' : 'tomas';
  return { performedBy: chance < 0.6 ? 'ines' : 'pell', reviewedBy };
}

const cleaningAgents: Record<string, string> = {
  'skerry-point': 'Detergent and soft brush',
  'lower-weir': 'Water and soft cloth',
  quarrybank: 'Dilute citric acid, 5 minutes',
  'hollow-fen': 'Detergent and soft brush',
};

export function calibrate(request: VisitRequest): Visit {
  const { point, profile, lots, at, seed } = request;
  const readings: PurposeReading[] = [];
  const lot = lotInUse(lots, point.solution, at);
  const secondLot = lotInUse(lots, point.secondSolution, at);
  const temperatureC = benchTemperature(request);
  const found = request.state;
  const asFound = makeStage(request, readings, {
    stage: 'as-found',
    lot,
    state: found,
    from: at + 12 * MINUTE_MS,
    count: 3,
    temperatureC,
  });
  const cleaned = cleanProbe(profile, found, seed);
  const asCleaned = makeStage(request, readings, {
    stage: 'as-found-cleaned',
    lot,
    state: cleaned,
    from: at + 34 * MINUTE_MS,
    count: 5,
    temperatureC,
  });
  const error = stageError(asCleaned, lot);
  const isAdjusted = Math.abs(error) > (ADJUSTMENT_SHARE * point.tolerancePercent) / 100;
  const before = found.cellConstantInUsePerCm;
  const after = isAdjusted ? roundCellConstant(before / (1 + error)) : before;
  const endAt = at + 74 * MINUTE_MS;
  const left = advanceProbe(profile, { ...cleaned, cellConstantInUsePerCm: after }, endAt, seed);
  const stages = [asFound, asCleaned];
  if (isAdjusted)
    stages.push(
      makeStage(request, readings, {
        stage: 'as-left',
        lot,
        state: left,
        from: at + 52 * MINUTE_MS,
        count: 3,
        temperatureC,
      }),
    );
  const secondPoint = makeStage(request, readings, {
    stage: 'as-left',
    lot: secondLot,
    state: left,
    from: at + 64 * MINUTE_MS,
    count: 3,
    temperatureC,
  });
  return {
    calibration: {
      key: `${request.probe.key}-${new Date(at).toISOString().slice(0, 10)}`,
      probeKey: request.probe.key,
      point: point.code,
      reason: request.reason,
      startedAt: at,
      signedAt: endAt,
      reviewedAt: endAt + Math.round((1 + 40 * uniformAt(request.ownSeed ^ 0x7e, at)) * 60) * MINUTE_MS,
      ...peopleOf(request),
      cleaningAgent: cleaningAgents[point.site] ?? 'Water',
      thermometer: point.site === 'hollow-fen' ? 'RT-07' : 'RT-05',
      stages,
      secondPoint,
      isAdjusted,
      cellConstantBeforePerCm: before,
      cellConstantAfterPerCm: after,
      truth: {
        foundEffectivePerCm: effectiveCellConstant(profile, found),
        cleanedEffectivePerCm: effectiveCellConstant(profile, cleaned),
      },
    },
    state: left,
    readings,
  };
}

/** Two years of readings, checks and calibrations of the whole group, from the simulator's own probe model. */
import type { ReadingContext, ReadingQuality } from '../../shared/contracts/vocabulary.ts';
import { settledSurroundings } from '../bench.ts';
import { bootIdAt } from '../boot.ts';
import { advanceProbe, observe, type ProbeProfile, type ProbeState, type Surroundings } from '../probe.ts';
import { seedFor, uniformAt } from '../random.ts';
import { flowOf, type WaterSample } from '../waters.ts';
import { lotsUntil } from './lots.ts';
import { probes } from './probes.ts';
import { processWater } from './process-waters.ts';
import { solutionOf } from './profiles.ts';
import { probeTimeline, type ProbeTimeline, type Stay } from './timeline.ts';
import type { LotSeed, ProbeSeed, PurposeReading } from './types.ts';

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;
export const demoSeed = 20_260;
export const historyDays = 730;

/** One reading as it would have come over the wire. (device, boot, n) is unique. */
export interface HistoryRow {
  probeKey: string;
  device: string;
  point: string;
  boot: string;
  n: number;
  at: number;
  context: ReadingContext;
  solution: string | null;
  conductanceUs: number;
  conductivityUsCm: number;
  temperatureC: number;
  quality: ReadingQuality;
}

export interface ScenarioHistory {
  startAt: number;
  endAt: number;
  lots: LotSeed[];
  timelines: ProbeTimeline[];
}

export interface HistoryOptions {
  endAt: number;
  seed?: number;
  days?: number;
}

/** Everything but the readings: who calibrated what and when, checks, cleanings, moves, and how each probe ended. */
export function scenarioHistory({
  endAt,
  seed = demoSeed,
  days = historyDays,
}: HistoryOptions): ScenarioHistory {
  const lots = lotsUntil(endAt);
  const timelines = probes.map((probe) => probeTimeline(probe, { endAt, seed, days, lots }));
  return { startAt: endAt - days * DAY_MS, endAt, lots, timelines };
}

/** Hours lost for good: the device was without power and buffered nothing. Three short outages in two years. */
function outagesOf(probe: ProbeSeed, startAt: number, endAt: number): { from: number; until: number }[] {
  const own = seedFor(0x0ff, probe.key);
  const third = (endAt - 5 * DAY_MS - startAt) / 3;
  return [0, 1, 2].map((index) => {
    const from = startAt + third * (index + 0.9 * uniformAt(own, index));
    return { from, until: from + (2 + 14 * uniformAt(own, index + 10)) * HOUR_MS };
  });
}

interface Place {
  stay: Stay;
  flow: ReturnType<typeof flowOf>;
}

/** Steps through a timeline's turns: the probe's state at each moment asked for, in rising order. */
function stateReader(timeline: ProbeTimeline, seed: number) {
  let index = 0;
  let state: ProbeState = timeline.turns[0]!.state;
  return (profile: ProbeProfile, at: number): ProbeState => {
    for (let next = timeline.turns[index + 1]; next && next.at <= at; next = timeline.turns[index + 1]) {
      index += 1;
      state = next.state;
    }
    state = advanceProbe(profile, state, at, seed);
    return state;
  };
}

/** Looks up, for rising moments, which of several periods a moment lies in. */
function periodReader<T>(periods: T[], fromOf: (period: T) => number, untilOf: (period: T) => number) {
  let index = 0;
  return (at: number): T | undefined => {
    while (index < periods.length && untilOf(periods[index]!) <= at) index += 1;
    const period = periods[index];
    return period !== undefined && at >= fromOf(period) ? period : undefined;
  };
}

/** The regular reading of a probe at a moment; undefined on the road and in an outage. */
function regularReader(timeline: ProbeTimeline, lots: LotSeed[], seed: number) {
  const { probe, stays, grid } = timeline;
  const ownSeed = seedFor(seed, probe.device);
  const boot = bootIdAt(grid.from);
  const stateAt = stateReader(timeline, seed);
  const lotByCode = new Map(lots.map((lot) => [lot.code, lot]));
  const places: Place[] = stays.map((stay) => ({ stay, flow: flowOf(processWater(stay.point.water), seed) }));
  const placeAt = periodReader(
    places,
    ({ stay }) => stay.from,
    ({ stay }) => stay.until,
  );
  const outages = outagesOf(probe, grid.from, grid.times.at(-1) ?? grid.from);
  const outageAt = periodReader(
    outages,
    (one) => one.from,
    (one) => one.until,
  );
  const visitAt = periodReader(
    timeline.calibrations,
    (one) => one.startedAt,
    (one) => one.signedAt + 6 * 60_000,
  );
  return (at: number, n: number): HistoryRow | undefined => {
    const place = placeAt(at);
    if (!place || outageAt(at)) return undefined;
    const visit = visitAt(at);
    const { profile, point } = place.stay;
    const around: Surroundings = visit
      ? settledSurroundings(solutionOf(lotByCode.get(visit.stages[0]!.lotCode)!), 18, at, ownSeed)
      : inPlace(place.flow(at));
    const seen = observe(profile, stateAt(profile, at), around, at, ownSeed);
    return {
      probeKey: probe.key,
      device: probe.device,
      point: point.code,
      boot,
      n,
      at,
      context: visit ? 'maintenance' : 'process',
      solution: null,
      conductanceUs: seen.conductanceUs,
      conductivityUsCm: seen.conductivityUsCm,
      temperatureC: seen.temperatureC,
      quality: seen.quality,
    };
  };
}

function inPlace(water: WaterSample): Surroundings {
  return { conductivityUsCm: water.conductivityUsCm, temperatureC: water.temperatureC, inPlace: true };
}

/** All readings of one probe in time order, regular ones and those taken on purpose. */
export function* probeReadings(
  timeline: ProbeTimeline,
  lots: LotSeed[],
  seed: number = demoSeed,
): Generator<HistoryRow> {
  const { grid, purposeReadings } = timeline;
  if (timeline.stays.length === 0) return;
  const regularAt = regularReader(timeline, lots, seed);
  const times = grid.times;
  let purposeIndex = 0;
  for (let gridIndex = 0; gridIndex < times.length; gridIndex += 1) {
    const at = times[gridIndex]!;
    while (purposeIndex < purposeReadings.length && purposeReadings[purposeIndex]!.at < at) {
      yield purposeRow(timeline, purposeReadings[purposeIndex]!);
      purposeIndex += 1;
    }
    const row = regularAt(at, gridIndex + 1 + purposeIndex);
    if (row) yield row;
  }
  for (const rest of purposeReadings.slice(purposeIndex)) yield purposeRow(timeline, rest);
}

function purposeRow({ probe, stays, grid }: ProbeTimeline, reading: PurposeReading): HistoryRow {
  const stay = stays.find(({ from, until }) => reading.at >= from && reading.at < until) ?? stays.at(-1)!;
  const place = {
    probeKey: probe.key,
    device: probe.device,
    point: stay.point.code,
    boot: bootIdAt(grid.from),
  };
  return { ...place, ...reading, quality: 'good' };
}

/** All readings of the group, probe after probe. */
export function* scenarioReadings(history: ScenarioHistory, seed: number = demoSeed): Generator<HistoryRow> {
  for (const timeline of history.timelines) yield* probeReadings(timeline, history.lots, seed);
}

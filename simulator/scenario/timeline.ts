/**
 * What people and flow cells did to one probe in two years: calibrations, cleanings, checks, moves, told by the probe's
 * own physics. Readings are made from it afterwards (history.ts), so both agree to the last digit.
 */
import { settledSurroundings } from '../bench.ts';
import {
  advanceProbe,
  cleanProbe,
  damageProbe,
  newProbeState,
  observe,
  type ProbeProfile,
  type ProbeState,
} from '../probe.ts';
import { seedFor, uniformAt } from '../random.ts';
import { flowOf } from '../waters.ts';
import { calibrate, type CalibrationSeed } from './calibration-visit.ts';
import { lotInUse } from './lots.ts';
import { points } from './points.ts';
import { processWater } from './process-waters.ts';
import { profileOf, solutionOf } from './profiles.ts';
import { makeReadingGrid, type ReadingGrid } from './reading-grid.ts';
import type { LotSeed, PointSeed, ProbeSeed, PurposeReading } from './types.ts';

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;

/** A comparison in the flow cell, found uncleaned, judged by the server as any check. */
export interface CheckSeed {
  probeKey: string;
  point: string;
  lotCode: string;
  at: number;
  n: number;
  conductivityUsCm: number;
  temperatureC: number;
  cellConstantPerCm: number;
}

export interface CleaningSeed {
  probeKey: string;
  point: string;
  at: number;
  by: string;
  agent: string;
}

/** The state from a moment on, wherever something changed it at once. */
export interface Turn {
  at: number;
  state: ProbeState;
}

export interface Stay {
  point: PointSeed;
  profile: ProbeProfile;
  from: number;
  until: number;
}

export interface ProbeTimeline {
  probe: ProbeSeed;
  stays: Stay[];
  grid: ReadingGrid;
  turns: Turn[];
  calibrations: CalibrationSeed[];
  checks: CheckSeed[];
  cleanings: CleaningSeed[];
  purposeReadings: PurposeReading[];
  endState: ProbeState;
  endProfile: ProbeProfile;
}

export interface TimelineOptions {
  endAt: number;
  seed: number;
  days: number;
  lots: LotSeed[];
}

type Deed =
  | { kind: 'damage'; at: number; change: number }
  | { kind: 'cleaning'; at: number }
  | { kind: 'check'; at: number }
  | { kind: 'calibration'; at: number; reason: CalibrationSeed['reason'] };

const pointByCode = new Map(points.map((point) => [point.code, point]));

/** Moves a moment into working hours of a weekday: probes are visited by people. */
function inWorkingHours(at: number, chance: number): number {
  const midnight = Math.floor(at / DAY_MS) * DAY_MS;
  const weekday = new Date(midnight).getUTCDay();
  const shift = weekday === 6 ? 2 : weekday === 0 ? 1 : 0;
  // 08:30 to 14:10 UTC, to the second, so that no visit reading falls on the regular grid.
  return midnight + shift * DAY_MS + Math.round((8.5 + 5.7 * chance) * 3600) * 1000 + 17_000;
}

function calibrationTimes(stay: Stay, own: number): number[] {
  const times = [inWorkingHours(stay.from + DAY_MS, uniformAt(own, 0))];
  for (let index = 1; ; index += 1) {
    const share = 0.86 + 0.2 * uniformAt(own, index);
    const days = Math.min(180, Math.max(60, stay.point.interval.days * share));
    const at = inWorkingHours(times.at(-1)! + days * DAY_MS, uniformAt(own ^ 0x9, index));
    if (at > stay.until - 4 * HOUR_MS) return times;
    times.push(at);
  }
}

function deedsOf(probe: ProbeSeed, stay: Stay, options: TimelineOptions): Deed[] {
  const own = seedFor(options.seed, `${probe.key} ${stay.point.code} deeds`);
  const deeds: Deed[] = calibrationTimes(stay, own).map((at, index) => ({
    kind: 'calibration',
    at,
    reason: index === 0 ? 'installation' : 'interval',
  }));
  if (probe.damage) {
    const { daysAgo, foundDaysAgo, percent } = probe.damage;
    const at = options.endAt - daysAgo * DAY_MS;
    const found = inWorkingHours(options.endAt - foundDaysAgo * DAY_MS, 0.4);
    // No routine visit between the knock and the suspicion, nor soon after it.
    const isNear = (deed: Deed) =>
      deed.kind === 'calibration' && deed.at > at - 20 * DAY_MS && deed.at < found + 60 * DAY_MS;
    const kept = deeds.filter((deed) => !isNear(deed));
    deeds.splice(
      0,
      deeds.length,
      ...kept,
      { kind: 'damage', at, change: percent / 100 },
      { kind: 'calibration', at: found, reason: 'suspicion' },
    );
  }
  const cleanEvery = stay.point.cleaningEveryDays;
  for (let at = stay.from; cleanEvery !== null && at < stay.until; at += cleanEvery * DAY_MS) {
    if (at > stay.from)
      deeds.push({ kind: 'cleaning', at: inWorkingHours(at, uniformAt(own ^ 0xc, at / DAY_MS)) });
  }
  const checkEvery = stay.point.checkEveryHours;
  for (let at = stay.from + 2 * DAY_MS; checkEvery !== null && at < stay.until; at += checkEvery * HOUR_MS) {
    deeds.push({ kind: 'check', at: at + 12 * 60_000 + 31_000 });
  }
  const calibrations = deeds.filter((deed) => deed.kind === 'calibration');
  // A person in front of the probe comes first: no automatic check or cleaning within three hours of a calibration.
  const isDisturbed = (deed: Deed) =>
    (deed.kind === 'check' || deed.kind === 'cleaning') &&
    calibrations.some((one) => deed.at > one.at - 3 * HOUR_MS && deed.at < one.at + 3 * HOUR_MS);
  return deeds.filter((deed) => deed.at < stay.until && !isDisturbed(deed)).sort((a, b) => a.at - b.at);
}

function staysOf(probe: ProbeSeed, options: TimelineOptions): Stay[] {
  const startAt = options.endAt - options.days * DAY_MS;
  return probe.assignments.flatMap(({ point: code, fromDaysAgo, untilDaysAgo }) => {
    const point = pointByCode.get(code);
    if (!point)
      throw new Error(
        `Probe ${probe.serial} stands at ${code}, which is no measuring point of the scenario.`,
      );
    const from = Math.max(startAt, options.endAt - fromDaysAgo * DAY_MS);
    const until = untilDaysAgo === null ? options.endAt : options.endAt - untilDaysAgo * DAY_MS;
    if (until <= from) return [];
    const lot =
      point.checkEveryHours === null ? null : lotInUse(options.lots, checkSolution(point), until - 1);
    return [{ point, profile: profileOf(probe, point, lot), from, until }];
  });
}

/** Flow cells hold the solution nearest to what the probe sees in service. */
export function checkSolution(point: PointSeed) {
  return point.solution;
}

interface Telling {
  options: TimelineOptions;
  probe: ProbeSeed;
  stay: Stay;
  ownSeed: number;
  flow: ReturnType<typeof flowOf>;
  timeline: ProbeTimeline;
  nextN: (at: number) => number;
}

function performCheck(
  { options, probe, stay, ownSeed, flow, timeline, nextN }: Telling,
  state: ProbeState,
  at: number,
): void {
  const lot = lotInUse(options.lots, checkSolution(stay.point), at);
  // The flow cell stands in the room: its solution comes a third of the way towards the process temperature.
  const temperatureC = Math.min(Math.max(18 + (flow(at).temperatureC - 18) / 3, 2), 34);
  const seen = observe(
    stay.profile,
    state,
    settledSurroundings(solutionOf(lot), temperatureC, at, ownSeed),
    at,
    ownSeed,
  );
  const n = nextN(at);
  timeline.checks.push({
    probeKey: probe.key,
    point: stay.point.code,
    lotCode: lot.code,
    at,
    n,
    conductivityUsCm: seen.conductivityUsCm,
    temperatureC: seen.temperatureC,
    cellConstantPerCm: state.cellConstantInUsePerCm,
  });
  timeline.purposeReadings.push({
    at,
    n,
    context: 'check',
    solution: lot.code,
    conductanceUs: seen.conductanceUs,
    conductivityUsCm: seen.conductivityUsCm,
    temperatureC: seen.temperatureC,
  });
}

function performDeed(telling: Telling, state: ProbeState, deed: Deed): ProbeState {
  const { options, probe, stay, ownSeed, timeline, nextN } = telling;
  switch (deed.kind) {
    case 'damage':
      return damageProbe(state, deed.change);
    case 'cleaning':
      timeline.cleanings.push({
        probeKey: probe.key,
        point: stay.point.code,
        at: deed.at,
        by: stay.point.site === 'hollow-fen' ? 'runa' : 'ines',
        agent: 'Water and soft brush',
      });
      return cleanProbe(stay.profile, state, options.seed);
    case 'check':
      performCheck(telling, state, deed.at);
      return state;
    case 'calibration': {
      const visit = calibrate({
        probe,
        point: stay.point,
        profile: stay.profile,
        lots: options.lots,
        seed: options.seed,
        ownSeed,
        state,
        at: deed.at,
        reason: deed.reason,
        nextN,
      });
      timeline.calibrations.push(visit.calibration);
      timeline.purposeReadings.push(...visit.readings);
      return visit.state;
    }
  }
}

/** Tells the life of one probe from the start of the history (or its installation) to the end. */
export function probeTimeline(probe: ProbeSeed, options: TimelineOptions): ProbeTimeline {
  const stays = staysOf(probe, options);
  const startAt = stays[0]?.from ?? options.endAt;
  const lastProfile = stays.at(-1)?.profile ?? profileOf(probe, null, null);
  const grid = makeReadingGrid(startAt, stays.at(-1)?.until ?? options.endAt, options.endAt);
  let state = newProbeState(lastProfile, startAt);
  const timeline: ProbeTimeline = {
    probe,
    stays,
    grid,
    turns: [{ at: startAt, state }],
    calibrations: [],
    checks: [],
    cleanings: [],
    purposeReadings: [],
    endState: state,
    endProfile: lastProfile,
  };
  const nextN = (at: number) => {
    purposeCount += 1;
    return grid.countUpTo(at) + purposeCount;
  };
  let purposeCount = 0;
  for (const stay of stays) {
    const ownSeed = seedFor(options.seed, probe.device);
    const telling: Telling = {
      options,
      probe,
      stay,
      ownSeed,
      flow: flowOf(processWater(stay.point.water), options.seed),
      timeline,
      nextN,
    };
    for (const deed of deedsOf(probe, stay, options)) {
      state = advanceProbe(stay.profile, state, deed.at, options.seed);
      const after = performDeed(telling, state, deed);
      if (after !== state) timeline.turns.push({ at: after.at, state: after });
      state = after;
    }
    state = advanceProbe(stay.profile, state, stay.until, options.seed);
    timeline.turns.push({ at: stay.until, state });
  }
  const lastN = grid.times.length + purposeCount;
  timeline.endState = { ...state, at: Math.max(state.at, options.endAt), n: lastN };
  return timeline;
}

import { pureWaterConductivity } from '../shared/science/water.ts';
import { seedFor, uniformAt, wanderAt } from './random.ts';

const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const DAY_MS = 24 * HOUR_MS;
const YEAR_MS = 365.2425 * DAY_MS;
/** Principal lunar tide, 12.4206 h. */
const TIDE_MS = 12.4206 * HOUR_MS;
/** Coldest water of the year: about 10 February in the north temperate zone (common experience). */
const COLDEST_DAY_MS = 40 * DAY_MS;
/** A change of liquid in a pipe reaches the probe smeared over about this time. */
const PIPE_MIXING_MS = 1.5 * MINUTE_MS;

/** One phase of a cleaning cycle: what runs past the probe, and for how long. */
export interface CyclePhase {
  name: string;
  minutes: number;
  conductivity25UsCm: number;
  temperatureC: number;
}

/** A process water as a recipe; `flowOf` cooks it for any moment. */
export interface Water {
  key: string;
  /** Waters of one site share weather and tide. */
  site: string;
  conductivity25UsCm: number;
  /** Shares of the mean conductivity: how far season, day, tide, slow wander and fast wander move it. */
  seasonalShare?: number;
  dailyShare?: number;
  tidalShare?: number;
  slowShare: number;
  fastShare: number;
  /** Concentrating boiler: rises from low to high share of the mean, then blows down. */
  sawtooth?: { hours: number; lowShare: number; highShare: number };
  cycle?: { hours: number; phases: CyclePhase[] };
  temperature: { meanC: number; seasonalC: number; dailyC: number; wanderC: number };
  /** Linear and quadratic coefficient of κ(t)/κ(25) of the dissolved salts, per K and per K². */
  salts: { linearPerK: number; squarePerK2: number };
  /** True where the water's own ions count (condensate). */
  nearlyPure?: boolean;
}

export interface WaterSample {
  conductivityUsCm: number;
  conductivity25UsCm: number;
  temperatureC: number;
}

function seasonOf(at: number): number {
  return -Math.cos((2 * Math.PI * (at - COLDEST_DAY_MS)) / YEAR_MS);
}

/** Warmest at about 15:00. */
function hourOf(at: number): number {
  return Math.cos((2 * Math.PI * (at - 15 * HOUR_MS)) / DAY_MS);
}

/** Seeds are strings hashed once per water, not once per reading. */
interface Seeds {
  site: number;
  own: number;
}

function temperatureOf(water: Water, at: number, seeds: Seeds): number {
  const { meanC, seasonalC, dailyC, wanderC } = water.temperature;
  const weather = wanderAt(seeds.site, at, 3 * DAY_MS);
  const own = wanderAt(seeds.own ^ 0x11, at, 40 * MINUTE_MS);
  return meanC + seasonalC * seasonOf(at) + dailyC * hourOf(at) + wanderC * (weather + 0.15 * own);
}

function sawtoothShare(water: Water, at: number): number {
  if (!water.sawtooth) return 1;
  const { hours, lowShare, highShare } = water.sawtooth;
  const position = (at / (hours * HOUR_MS)) % 1;
  // Nine tenths of the time the boiler concentrates; the last tenth it blows down.
  const filled = position < 0.9 ? position / 0.9 : (1 - position) / 0.1;
  return lowShare + (highShare - lowShare) * filled;
}

function steadyConductivity25(water: Water, at: number, seeds: Seeds): number {
  const moved =
    1 +
    (water.seasonalShare ?? 0) * seasonOf(at) +
    (water.dailyShare ?? 0) * hourOf(at) +
    (water.tidalShare ?? 0) * Math.cos((2 * Math.PI * at) / TIDE_MS) +
    water.slowShare * wanderAt(seeds.own, at, 2 * DAY_MS) +
    water.fastShare * wanderAt(seeds.own ^ 0x77, at, 9 * MINUTE_MS);
  return water.conductivity25UsCm * moved * sawtoothShare(water, at);
}

/** The phase at a moment and the one before it; undefined between two cleaning cycles. */
function phaseAt(cycle: NonNullable<Water['cycle']>, at: number, offset: number) {
  let minutes = ((at / HOUR_MS + offset * cycle.hours) % cycle.hours) * 60;
  let before: CyclePhase | undefined;
  for (const phase of cycle.phases) {
    if (minutes < phase.minutes) return { phase, before, elapsedMs: minutes * MINUTE_MS };
    minutes -= phase.minutes;
    before = phase;
  }
  return { phase: undefined, before, elapsedMs: minutes * MINUTE_MS };
}

interface Liquid {
  conductivity25: number;
  temperature: number;
}

function liquidAt(water: Water, at: number, seeds: Seeds): Liquid {
  const resting = {
    conductivity25: steadyConductivity25(water, at, seeds),
    temperature: temperatureOf(water, at, seeds),
  };
  if (!water.cycle) return resting;
  const { phase, before, elapsedMs } = phaseAt(water.cycle, at, uniformAt(seeds.own, 1));
  const strength = 1 + 0.03 * wanderAt(seeds.own ^ 0x3c, at, 6 * HOUR_MS);
  const liquid = (p: CyclePhase | undefined): Liquid =>
    p ? { conductivity25: p.conductivity25UsCm * strength, temperature: p.temperatureC } : resting;
  const remains = Math.exp(-elapsedMs / PIPE_MIXING_MS);
  const to = liquid(phase);
  const from = liquid(before);
  return {
    conductivity25: to.conductivity25 + (from.conductivity25 - to.conductivity25) * remains,
    temperature: to.temperature + (from.temperature - to.temperature) * remains,
  };
}

/** What flows past the probe, as a function of time: the truth that no instrument sees exactly. */
export function flowOf(water: Water, seed: number): (at: number) => WaterSample {
  const seeds = { site: seedFor(seed, water.site), own: seedFor(seed, water.key) };
  const { linearPerK, squarePerK2 } = water.salts;
  const ownIons25 = water.nearlyPure ? pureWaterConductivity(25) : 0;
  return (at) => {
    const { conductivity25, temperature } = liquidAt(water, at, seeds);
    const temperatureC = Math.min(Math.max(temperature, 0.5), 99);
    const delta = temperatureC - 25;
    const ratio = 1 + linearPerK * delta + squarePerK2 * delta * delta;
    const ownIons = water.nearlyPure ? pureWaterConductivity(temperatureC) : 0;
    return {
      conductivity25UsCm: conductivity25,
      conductivityUsCm: Math.max(conductivity25 - ownIons25, 0) * ratio + ownIons,
      temperatureC,
    };
  };
}

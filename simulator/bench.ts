import type { StandardBasis } from '../shared/contracts/vocabulary.ts';
import { kclStandardConductivity } from '../shared/science/kcl-standards.ts';
import type { ProbeProfile, Surroundings } from './probe.ts';
import { normalAt, wanderAt } from './random.ts';

/** What is truly in a bottle. `deviation` is how far the liquid is from its certificate; no instrument knows it. */
export interface ReferenceSolution {
  code: string;
  basis: StandardBasis;
  /** mol/kg, demal or mol/L by the basis; null when only the certificate's table describes the solution. */
  nominal: 0.01 | 0.1 | 1 | null;
  /** Null where the basis says it all: the published value is taken as certified. */
  certified25UsCm: number | null;
  table: { temperatureC: number; conductivityUsCm: number }[] | null;
  deviation: number;
}

/** A probe put into a solution: since when, how warm the liquid is and how warm the probe was. */
export interface Immersion {
  solution: ReferenceSolution;
  temperatureC: number;
  startedAt: number;
  fromTemperatureC: number;
}

const MINUTE_MS = 60_000;
/** Rinse water left on the cell: 0.4 % at first, mixed away over about twelve seconds of stirring. */
const CARRY_OVER = 0.004;
const MIXING_MS = 12_000;
/** Bubbles, residual rinse water, wall distance: what differs from one immersion to the next, standard deviation. */
const IMMERSION_SD = 0.0008;
/** A probe body warms or cools its own portion of liquid by this share of the difference. */
const BODY_SHARE = 0.2;
/** A bench follows its room by a few hundredths of a degree. */
const ROOM_WANDER_C = 0.03;

function tableConductivity(table: NonNullable<ReferenceSolution['table']>, temperatureC: number): number {
  const upper = table.findIndex((row) => row.temperatureC >= temperatureC);
  const high = table[Math.max(upper, 1)];
  const low = table[Math.max(upper, 1) - 1];
  if (upper < 0 || !high || !low || temperatureC < low.temperatureC) {
    throw new RangeError(
      `The solution's table does not cover ${temperatureC} °C; give a temperature inside it.`,
    );
  }
  const share = (temperatureC - low.temperatureC) / (high.temperatureC - low.temperatureC);
  return low.conductivityUsCm + share * (high.conductivityUsCm - low.conductivityUsCm);
}

/** What the certificate says the solution conducts at a temperature, µS/cm. */
export function certifiedConductivity(solution: ReferenceSolution, temperatureC: number): number {
  const { basis, nominal, table } = solution;
  if (table) return tableConductivity(table, temperatureC);
  if (basis === 'other' || nominal === null) {
    throw new RangeError(`Solution ${solution.code} has neither a KCl basis nor a table; give one of them.`);
  }
  const at = kclStandardConductivity({ basis, nominal, temperatureC }).conductivityUsCm;
  if (solution.certified25UsCm === null) return at;
  const at25 = kclStandardConductivity({ basis, nominal, temperatureC: 25 }).conductivityUsCm;
  return at * (solution.certified25UsCm / at25);
}

/** What the liquid truly conducts at a temperature, µS/cm. */
export function solutionConductivity(solution: ReferenceSolution, temperatureC: number): number {
  return certifiedConductivity(solution, temperatureC) * (1 + solution.deviation);
}

/** Surroundings of an immersed probe: temperature and concentration settle exponentially after immersion. */
export function benchSurroundings(
  profile: ProbeProfile,
  immersion: Immersion,
  at: number,
  ownSeed: number,
): Surroundings {
  const elapsedMs = Math.max(0, at - immersion.startedAt);
  const responseMs = profile.temperature.responseS * 1000;
  const difference = immersion.fromTemperatureC - immersion.temperatureC;
  const room = ROOM_WANDER_C * wanderAt(ownSeed ^ 0x40, at, 12 * MINUTE_MS);
  const liquidC =
    immersion.temperatureC + room + BODY_SHARE * difference * Math.exp(-elapsedMs / (2 * responseMs));
  const sensorC = immersion.temperatureC + room + difference * Math.exp(-elapsedMs / responseMs);
  const carried = 1 - CARRY_OVER * Math.exp(-elapsedMs / MIXING_MS);
  const immersionError = 1 + IMMERSION_SD * normalAt(ownSeed ^ 0x41, immersion.startedAt);
  return {
    conductivityUsCm: solutionConductivity(immersion.solution, liquidC) * carried * immersionError,
    temperatureC: sensorC,
    inPlace: false,
  };
}

/** Surroundings once everything has settled: a flow cell checks only then. */
export function settledSurroundings(
  solution: ReferenceSolution,
  temperatureC: number,
  at: number,
  ownSeed: number,
): Surroundings {
  const spread = 1 + IMMERSION_SD * normalAt(ownSeed ^ 0x42, at);
  return {
    conductivityUsCm: solutionConductivity(solution, temperatureC) * spread,
    temperatureC,
    inPlace: false,
  };
}

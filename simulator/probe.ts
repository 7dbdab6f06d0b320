/**
 * The physical probe. Two things are kept apart: what the cell really is (`lnAgeing`, `deposit`), which nobody can
 * see, and what the device believes (`cellConstantInUsePerCm`). All functions are pure: the history generator steps
 * the same code through two years that the live simulator steps in real time.
 */
import type { ProbeKind, ReadingFlag, ReadingQuality } from '../shared/contracts/vocabulary.ts';
import { normalAt, seedFor, uniformAt } from './random.ts';

export interface ProbeProfile {
  device: string;
  serial: string;
  kind: ProbeKind;
  firmware: string;
  /** True cell constant when new and clean. */
  newCellConstantPerCm: number;
  rangeLowUsCm: number;
  rangeHighUsCm: number;
  resolutionUsCm: number;
  intervalS: number;
  compensation: {
    model: 'none' | 'linear' | 'natural-water';
    coefficientPercentPerK: number | null;
    referenceC: number | null;
  };
  /** Key of the process water in scenario/process-waters.ts. */
  water: string;
  /** ln K per day, and its random walk per square root of a day. */
  ageing: { perDay: number; walkPerRootDay: number };
  /** Share of the cell lost to deposit per day after a cleaning, and where it levels off. */
  fouling: { perDay: number; ceiling: number };
  noise: { relative: number; absoluteUsCm: number };
  temperature: { offsetC: number; noiseC: number; responseS: number };
  /** Resistance in series with the cell (leads, polarised electrodes); only two-electrode cells feel it. */
  seriesResistanceOhm: number;
  /** Parallel leakage of cable and insulator: what the device shows in dry air. */
  leakageUs: number;
  /** Indicated / true in the place of use because of near walls; 1 in a wide vessel. */
  installationFactor: number;
  /** Flow cell that admits a reference solution by itself. */
  check: { solution: string; everyHours: number } | null;
}

/** Everything about a probe that time changes; plain JSON, so that the live simulator takes up where history ends. */
export interface ProbeState {
  at: number;
  /** Quarter days since the epoch already lived through. */
  quantum: number;
  lnAgeing: number;
  deposit: number;
  cellConstantInUsePerCm: number;
  /** Last sequence number used. */
  n: number;
}

export interface Surroundings {
  conductivityUsCm: number;
  temperatureC: number;
  /** False in a wide vessel of solution: no walls near an inductive probe. */
  inPlace: boolean;
}

export interface Observation {
  conductanceUs: number;
  conductivityUsCm: number;
  temperatureC: number;
  quality: ReadingQuality;
  flags: ReadingFlag[];
}

const DAY_MS = 86_400_000;
/** Ageing and deposit move in quarter days: slow against a reading, fine against a calibration interval. */
const QUANTUM_MS = DAY_MS / 4;
/** What a cleaning leaves behind at most, as a share of the deposit. */
const CLEANING_LEAVES = 0.06;
const TEMPERATURE_STEP_C = 0.01;

export function newProbeState(profile: ProbeProfile, at: number): ProbeState {
  return {
    at,
    quantum: Math.floor(at / QUANTUM_MS),
    lnAgeing: 0,
    deposit: 0,
    cellConstantInUsePerCm: roundCellConstant(profile.newCellConstantPerCm),
    n: 0,
  };
}

/** Devices keep a cell constant to five significant digits. */
export function roundCellConstant(perCm: number): number {
  const step = 10 ** (Math.floor(Math.log10(perCm)) - 4);
  return Number((Math.round(perCm / step) * step).toPrecision(5));
}

/** Lives on to `at`: the path depends on the seed and the calendar only, not on how often it is asked. */
export function advanceProbe(profile: ProbeProfile, state: ProbeState, at: number, seed: number): ProbeState {
  const last = Math.floor(at / QUANTUM_MS);
  if (last <= state.quantum) return at > state.at ? { ...state, at } : state;
  const own = seedFor(seed, profile.device);
  let { lnAgeing, deposit } = state;
  for (let quantum = state.quantum + 1; quantum <= last; quantum += 1) {
    lnAgeing += profile.ageing.perDay / 4 + profile.ageing.walkPerRootDay * 0.5 * normalAt(own, quantum);
    // Deposit grows unevenly and slows towards its ceiling, where flow tears off what is added.
    const vigour = 0.4 + 1.2 * uniformAt(own ^ 0x51, quantum);
    const room = Math.max(0, 1 - deposit / profile.fouling.ceiling);
    deposit += (profile.fouling.perDay / 4) * vigour * room;
  }
  return { ...state, at, quantum: last, lnAgeing, deposit };
}

export function cleanProbe(profile: ProbeProfile, state: ProbeState, seed: number): ProbeState {
  const leaves = CLEANING_LEAVES * uniformAt(seedFor(seed, profile.device) ^ 0xc1ea, state.quantum);
  return { ...state, deposit: state.deposit * leaves };
}

/** A knock or a bent electrode: the cell constant changes at once. */
export function damageProbe(state: ProbeState, relativeChange: number): ProbeState {
  return { ...state, lnAgeing: state.lnAgeing + Math.log(1 + relativeChange) };
}

/** Cell constant of the cell as it is, without deposit. */
export function trueCellConstant(profile: ProbeProfile, state: ProbeState): number {
  return profile.newCellConstantPerCm * Math.exp(state.lnAgeing);
}

/** The cell constant that would make the device right today, deposit included. */
export function effectiveCellConstant(profile: ProbeProfile, state: ProbeState): number {
  return trueCellConstant(profile, state) / (1 - state.deposit);
}

/** Indicated / true − 1 in a reference solution, without noise. */
export function trueRelativeError(profile: ProbeProfile, state: ProbeState): number {
  return state.cellConstantInUsePerCm / effectiveCellConstant(profile, state) - 1;
}

function cellConductance(profile: ProbeProfile, state: ProbeState, around: Surroundings): number {
  const wall = around.inPlace ? profile.installationFactor : 1;
  const ideal = (around.conductivityUsCm * wall) / effectiveCellConstant(profile, state);
  const series = profile.kind === 'two-electrode' ? profile.seriesResistanceOhm : 0;
  // 1/(R + Rs) with G in µS: the leads matter more the better the water conducts.
  return ideal / (1 + ideal * 1e-6 * series) + profile.leakageUs;
}

/** Rounds to a step without the binary tail: 1061.3000000000002 would travel and be stored as such. */
export function roundTo(value: number, step: number): number {
  const rounded = Math.round(value / step) * step;
  return Math.round(rounded * 1e6) / 1e6;
}

/** One reading: raw conductivity = conductance × the cell constant in use, at the temperature the sensor shows. */
export function observe(
  profile: ProbeProfile,
  state: ProbeState,
  around: Surroundings,
  at: number,
  ownSeed: number,
): Observation {
  const { relative, absoluteUsCm } = profile.noise;
  const noise = 1 + relative * normalAt(ownSeed ^ 0x01, at);
  const floor = (absoluteUsCm / state.cellConstantInUsePerCm) * normalAt(ownSeed ^ 0x02, at);
  const conductanceUs = Math.max(0, cellConductance(profile, state, around) * noise + floor);
  const raw = roundTo(conductanceUs * state.cellConstantInUsePerCm, profile.resolutionUsCm);
  const temperatureC = roundTo(
    around.temperatureC +
      profile.temperature.offsetC +
      profile.temperature.noiseC * normalAt(ownSeed ^ 0x03, at),
    TEMPERATURE_STEP_C,
  );
  const flags: ReadingFlag[] = [];
  if (raw > profile.rangeHighUsCm) flags.push('over');
  else if (raw < profile.rangeLowUsCm) flags.push('under');
  const shown = Math.min(raw, profile.rangeHighUsCm);
  return {
    // The wire carries conductance as the quotient, so that raw = G × K holds to the last digit shown.
    conductanceUs: roundTo(shown / state.cellConstantInUsePerCm, 1e-4),
    conductivityUsCm: shown,
    temperatureC,
    quality: flags.includes('over') ? 'bad' : flags.length > 0 ? 'doubtful' : 'good',
    flags,
  };
}

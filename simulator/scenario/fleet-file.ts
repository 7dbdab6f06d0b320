import type { ReferenceSolution } from '../bench.ts';
import type { ProbeProfile, ProbeState } from '../probe.ts';
import type { ScenarioHistory } from './history.ts';
import { solutionOf } from './profiles.ts';

/** One device of the credentials file: who it is, its password, and how its probe was when the history ended. */
export interface FleetDevice {
  device: string;
  secret: string;
  profile?: ProbeProfile;
  state?: ProbeState;
}

/** The credentials file the simulator reads: plain JSON. */
export interface FleetFile {
  devices: FleetDevice[];
  /** What is truly in the bottles that the probes may be put into. */
  solutions?: ReferenceSolution[];
  /** Seed of the history, so that waters and ageing go on without a seam. */
  seed?: number;
}

/** Where every installed probe stands when the history ends; the loader adds the secrets it issued. */
export function fleetAtEnd(
  history: ScenarioHistory,
  seed: number,
): Required<Omit<FleetFile, 'devices'>> & {
  devices: Required<Omit<FleetDevice, 'secret'>>[];
} {
  const devices = history.timelines
    .filter((timeline) => timeline.probe.status === 'in-service')
    .map(({ probe, endProfile, endState }) => ({
      device: probe.device,
      profile: endProfile,
      state: endState,
    }));
  return { devices, solutions: history.lots.map(solutionOf), seed };
}

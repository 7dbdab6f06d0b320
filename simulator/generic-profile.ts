import { newProbeState, type ProbeProfile, type ProbeState } from './probe.ts';
import { normalAt, seedFor } from './random.ts';
import { processWaters } from './scenario/process-waters.ts';

/** A believable probe for a device of which only the name is known: fleets for load tests need no scenario. */
export function genericProbe(
  device: string,
  seed: number,
  at: number,
): { profile: ProbeProfile; state: ProbeState } {
  const own = seedFor(seed, device);
  const water = processWaters[(own >>> 0) % processWaters.length] ?? processWaters[0]!;
  const isStrong = water.conductivity25UsCm >= 2000;
  const isPure = water.conductivity25UsCm < 400;
  const nominal = isStrong ? 0.5 : isPure ? 0.1 : 0.5;
  const profile: ProbeProfile = {
    device,
    serial: device.toUpperCase(),
    kind: isStrong ? 'four-electrode' : 'two-electrode',
    firmware: isStrong ? '4.0.2' : '3.1.4',
    newCellConstantPerCm: nominal * (1 + 0.01 * normalAt(own, 1)),
    rangeLowUsCm: 0,
    rangeHighUsCm: isStrong ? 200_000 : 10_000,
    resolutionUsCm: isStrong ? 1 : isPure ? 0.01 : 0.1,
    intervalS: 5,
    compensation: { model: 'linear', coefficientPercentPerK: 2, referenceC: 25 },
    water: water.key,
    ageing: { perDay: 3e-5, walkPerRootDay: 1.6e-4 },
    fouling: { perDay: 1e-4, ceiling: 0.012 },
    noise: { relative: 5e-4, absoluteUsCm: isPure ? 0.005 : 0.1 },
    temperature: { offsetC: 0.05 * normalAt(own, 2), noiseC: 0.008, responseS: 16 },
    seriesResistanceOhm: 0.05,
    leakageUs: 0.002,
    installationFactor: 1,
    check: null,
  };
  return { profile, state: newProbeState(profile, at) };
}

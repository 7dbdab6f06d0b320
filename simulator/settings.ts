import { createHash } from 'node:crypto';
import type { BirthMessage } from '../shared/contracts/mqtt.ts';
import type { ProbeProfile } from './probe.ts';

/** The settings a device reports in its birth; any change of them changes the hash. */
export function settingsOf(profile: ProbeProfile, cellConstantPerCm: number, intervalS: number) {
  const { model, coefficientPercentPerK, referenceC } = profile.compensation;
  return {
    cell_constant_per_cm: cellConstantPerCm,
    compensation: { model, coefficient_percent_per_k: coefficientPercentPerK, reference_c: referenceC },
    range_low_us_cm: profile.rangeLowUsCm,
    range_high_us_cm: profile.rangeHighUsCm,
    resolution_us_cm: profile.resolutionUsCm,
    interval_s: intervalS,
  } satisfies Partial<BirthMessage>;
}

export function settingsHashOf(settings: ReturnType<typeof settingsOf>): string {
  return `sha256:${createHash('sha256').update(JSON.stringify(settings)).digest('hex')}`;
}

/**
 * Conductivity of pure water: IAPWS release on electrolytic conductivity (after Marshall 1987), table II, published;
 * T. S. Light et al., Electrochem. Solid-State Lett. 8 (2005) E16, from memory (high at 25 degC, medium at 0 to 20, low at 50, medium at 100).
 * The two disagree by up to 4.9 % (10 degC): 2 % is taken as the standard uncertainty away from 25 degC.
 */
import { describe, expect, it } from 'vitest';
import {
  pureWaterConductivity,
  pureWaterConductivityAtDensity,
  pureWaterRelativeUncertainty,
} from '../../shared/science/water.ts';
import { relativeError } from './relative-error.ts';

describe('conductivity of pure water', () => {
  // Three printed digits: half a unit of the last one is at most 0.22 %.
  it.each([
    [600, 673.15, 1.57e-4],
    [900, 473.15, 4.19e-4],
    [1100, 273.16, 3.33e-6],
    [1100, 473.15, 2.28e-3],
  ])('reproduces the release at %d kg/m3 and %d K', (density, kelvin, siemensPerMetre) => {
    const computed = pureWaterConductivityAtDensity(kelvin - 273.15, density) / 1e4;
    expect(relativeError(computed, siemensPerMetre)).toBeLessThan(2.2e-3);
  });

  it('is 0.05501 uS/cm (18.18 Mohm cm) at 25 degC within the measured 0.0001', () => {
    expect(Math.abs(pureWaterConductivity(25) - 0.05501)).toBeLessThan(1e-4);
  });

  it.each([
    [0, 0.01161],
    [10, 0.02315],
    [20, 0.04205],
    [50, 0.172],
    [100, 0.7768],
  ])('meets the other lineage at %d degC within two and a half of the stated uncertainty', (t, other) => {
    expect(relativeError(pureWaterConductivity(t), other)).toBeLessThan(
      2.5 * pureWaterRelativeUncertainty(t),
    );
  });

  it('changes by 5.6 %/K at 25 degC, three times as fast as a salt solution', () => {
    const perK = Math.log(pureWaterConductivity(25.5) / pureWaterConductivity(24.5));
    expect(perK).toBeCloseTo(0.056, 3);
  });
});

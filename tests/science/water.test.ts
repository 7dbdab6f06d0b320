import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import {
  pureWaterConductivity,
  pureWaterConductivityAtDensity,
  pureWaterRelativeUncertainty,
  waterDensity,
  waterPermittivity,
  waterViscosity,
} from '../../shared/science/water.ts';

const properties = {
  waterDensity,
  waterViscosity,
  waterPermittivity,
  pureWaterConductivity,
  pureWaterRelativeUncertainty,
};
const liquid = fc.double({ min: 0, max: 100, noNaN: true });

describe('water', () => {
  it.each(Object.entries(properties))('%s answers at both ends and refuses beyond them', (_, property) => {
    expect(property(0)).toBeGreaterThan(0);
    expect(property(100)).toBeGreaterThan(0);
    for (const t of [-0.001, 100.001, NaN, Infinity, -Infinity]) {
      expect(() => property(t)).toThrow(OutOfDomainError);
    }
  });

  it('gets thinner, less polar and more conducting as it warms', () => {
    fc.assert(
      fc.property(liquid, liquid, (a, b) => {
        const [cold, warm] = a < b ? [a, b] : [b, a];
        if (warm - cold < 1e-6) return;
        expect(waterViscosity(warm)).toBeLessThan(waterViscosity(cold));
        expect(waterPermittivity(warm)).toBeLessThan(waterPermittivity(cold));
        expect(pureWaterConductivity(warm)).toBeGreaterThan(pureWaterConductivity(cold));
      }),
    );
  });

  it('is heaviest near 4 degC', () => {
    expect(waterDensity(4)).toBeGreaterThan(waterDensity(2));
    expect(waterDensity(4)).toBeGreaterThan(waterDensity(6));
  });

  it('states a ten times larger spread away from 25 degC, where sources disagree', () => {
    expect(pureWaterRelativeUncertainty(25)).toBe(0.002);
    expect(pureWaterRelativeUncertainty(10)).toBe(0.02);
  });

  it('refuses steam, which the liquid equation knows nothing of', () => {
    expect(() => pureWaterConductivityAtDensity(25, 599)).toThrow(OutOfDomainError);
    expect(() => pureWaterConductivityAtDensity(801, 700)).toThrow(OutOfDomainError);
  });
});

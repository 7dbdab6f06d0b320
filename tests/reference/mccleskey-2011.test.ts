/**
 * R. B. McCleskey, J. Chem. Eng. Data 56 (2011) 317: KCl by molality and temperature. Provenance: published, coefficients read.
 * It disagrees with the primary table by +0.35 to +0.7 % (0.01 mol/kg) and +0.4 to +1.1 % (0.1 mol/kg): a field-grade equation,
 * therefore compared with and not used.
 */
import { describe, expect, it } from 'vitest';
import { convertConcentration } from '../../shared/science/concentration.ts';
import { kclStandardConductivity } from '../../shared/science/kcl-standards.ts';

function fieldEquation(molality: number, t: number): number {
  const limiting = 0.009385 * t ** 2 + 2.533 * t + 81.17;
  const slope = 0.0139 * t ** 2 + 1.886 * t + 44.11;
  const root = Math.sqrt(molality);
  return limiting - (slope * root) / (1 + 1.7 * root);
}

describe('the field equation for KCl', () => {
  const distances = [
    [0.01, 0.2, 0.75],
    [0.1, 0.38, 1.15],
  ] as const;
  it.each(distances)(
    'stands %d mol/kg off the primary table by its known distance',
    (nominal, least, most) => {
      for (let temperatureC = 10; temperatureC <= 40; temperatureC += 5) {
        const primary = kclStandardConductivity({ basis: 'molal', nominal, temperatureC }).conductivityUsCm;
        const molar = convertConcentration({ value: nominal, from: 'molal', to: 'molar', temperatureC });
        const percent = 100 * ((1000 * molar * fieldEquation(nominal, temperatureC)) / primary - 1);
        expect(percent).toBeGreaterThan(least);
        expect(percent).toBeLessThan(most);
      }
    },
  );
});

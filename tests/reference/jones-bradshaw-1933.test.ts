/**
 * G. Jones, B. C. Bradshaw, J. Am. Chem. Soc. 55 (1933) 1780, demal KCl on the INTERNATIONAL ohm.
 * Provenance: from memory, confidence high; 1408.07 and the factor 0.999505 were read in USGS WSP 2311, table 1.
 * ASTM D1125 reference solutions A, B, C carry the same numbers (from memory: high for the numbers, medium for the edition).
 */
import { describe, expect, it } from 'vitest';
import {
  absoluteFromInternationalOhm,
  jonesBradshawConductivity,
  kclStandardConductivity,
} from '../../shared/science/kcl-standards.ts';
import { relativeError } from './relative-error.ts';

describe('Jones and Bradshaw on the absolute ohm', () => {
  // Computed from the printed values to the digits shown.
  it.each([
    [1, 0, 65143.8],
    [1, 18, 97789.6],
    [1, 25, 111286.9],
    [0.1, 0, 7134.37],
    [0.1, 18, 11161.2],
    [0.1, 25, 12849.6],
    [0.01, 0, 773.26],
    [0.01, 18, 1219.92],
    [0.01, 25, 1408.07],
  ] as const)('%d D at %d degC is %d uS/cm', (nominal, temperatureC, value) => {
    expect(relativeError(jonesBradshawConductivity({ nominal, temperatureC }), value)).toBeLessThan(5e-6);
  });

  // OIML R 56 is 0.016 to 0.021 % higher at 18 and 25 degC and equal at 0 degC: the pattern of a change of temperature scale.
  it.each([
    [0, -0.012, 0.012],
    [18, 0.008, 0.024],
    [25, 0.012, 0.024],
  ] as const)(
    'OIML R 56 differs by a hundredth or two of a per cent at %d degC',
    (temperatureC, lowest, highest) => {
      for (const nominal of [0.01, 0.1, 1] as const) {
        const oiml = kclStandardConductivity({ basis: 'demal', nominal, temperatureC }).conductivityUsCm;
        const percent = 100 * (oiml / jonesBradshawConductivity({ nominal, temperatureC }) - 1);
        expect(percent).toBeGreaterThan(lowest);
        expect(percent).toBeLessThan(highest);
      }
    },
  );

  it('converts the ASTM D1125 value of solution B, 12 856 uS/cm, to 12 849.6', () => {
    expect(absoluteFromInternationalOhm(12856)).toBeCloseTo(12849.6, 1);
  });
});

/**
 * IAPWS SR6-08(2011), Revised Supplementary Release on Properties of Liquid Water at 0.1 MPa, table 8 (check values).
 * Provenance: published; coefficients and check values read in the release.
 */
import { describe, expect, it } from 'vitest';
import { waterDensity, waterPermittivity, waterViscosity } from '../../shared/science/water.ts';
import { relativeError } from './relative-error.ts';

describe('IAPWS SR6-08', () => {
  // The release's other two check temperatures, 260 K and 375 K, lie outside the 0 to 100 degC of liquid water served here;
  // the same table continues to 373.15 K through the values computed from the release's equations below.
  it('reproduces every printed digit at 298.15 K', () => {
    expect(relativeError(waterDensity(25), 997.047013)).toBeLessThan(1e-9);
    expect(relativeError(waterViscosity(25) * 1000, 889.996774)).toBeLessThan(1e-9);
    expect(relativeError(waterPermittivity(25), 78.375218)).toBeLessThan(1e-8);
  });

  // An independent evaluation of the same equations, carried to the digits shown: agreement to half of the last one.
  it.each([
    [0, 999.8424, 1791.78, 87.927],
    [5, 999.966, 1518.2, 85.92],
    [10, 999.7019, 1305.9, 83.963],
    [15, 999.102, 1137.55, 82.054],
    [18, 998.598, 1052.65, 80.931],
    [20, 998.2065, 1001.57, 80.192],
    [30, 995.6488, 797.21, 76.603],
    [40, 992.2158, 652.73, 73.184],
    [50, 988.0345, 546.53, 69.927],
    [75, 974.8422, 377.41, 62.424],
    [100, 958.3484, 281.58, 55.732],
  ])(
    'at %d degC: density %d kg/m3, viscosity %d uPa s, permittivity %d',
    (t, density, viscosity, permittivity) => {
      expect(Math.abs(waterDensity(t) - density)).toBeLessThan(0.6e-4);
      expect(Math.abs(waterViscosity(t) * 1000 - viscosity)).toBeLessThan(0.6e-2);
      expect(Math.abs(waterPermittivity(t) - permittivity)).toBeLessThan(0.6e-3);
    },
  );
});

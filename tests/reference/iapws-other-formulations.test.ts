/**
 * IAPWS R8-97 (permittivity) and R12-08 (viscosity): the formulations NOT used, for the size of the difference.
 * Provenance: published; differences computed from both releases' equations at 0.1 MPa.
 * The two sources disagree on the permittivity: SR6-08 78.375, R8-97 78.408 at 25 degC. Older handbooks say 78.54.
 */
import { describe, expect, it } from 'vitest';
import { waterPermittivity, waterViscosity } from '../../shared/science/water.ts';
import { relativeError } from './relative-error.ts';

describe('water by other IAPWS releases', () => {
  // 0.042 % is the known difference at 25 degC; a mixed-up formulation would make it 0 and fail.
  it('differs from the R8-97 permittivity by 0.042 % at 25 degC', () => {
    expect(100 * (waterPermittivity(25) / 78.408 - 1)).toBeCloseTo(-0.042, 3);
  });

  it('agrees with the R12-08 viscosity at 25 degC (889.7351 uPa s at 998 kg/m3) within its 300 ppm of pressure effect', () => {
    expect(relativeError(waterViscosity(25) * 1000, 889.7351)).toBeLessThan(3.1e-4);
  });
});

/**
 * P. Debye, H. Falkenhagen, Physik. Z. 29 (1928) 121, 401; H. Falkenhagen, Electrolytes (1934): relaxation time of the ionic atmosphere.
 * Provenance: from memory, confidence medium (0.553e-9 s for KCl 0.1 mol/L at 18 degC).
 */
import { describe, expect, it } from 'vitest';
import { highestMeasuringFrequency, relaxationTime } from '../../shared/science/onsager.ts';
import { relativeError } from './relative-error.ts';

describe('relaxation of the ionic atmosphere', () => {
  it('takes 0.553 ns in KCl 0.1 mol/L at 18 degC, with the permittivity 81 of the time', () => {
    const seconds = relaxationTime({
      concentrationMolL: 0.1,
      molarConductivity: 129.65,
      temperatureC: 18,
      relativePermittivity: 81,
    });
    expect(relativeError(seconds, 0.553e-9)).toBeLessThan(1e-3);
  });

  it('takes 46.3 ns at 0.001 mol/L and 25 degC', () => {
    const seconds = relaxationTime({ concentrationMolL: 0.001, molarConductivity: 149.85, temperatureC: 25 });
    expect(relativeError(seconds, 4.63e-8)).toBeLessThan(1e-3);
  });

  it('lets ordinary bridges of 0.1 to 10 kHz see no dispersion in any solution of 5 uS/cm or more', () => {
    const hertz = highestMeasuringFrequency({
      concentrationMolL: 3.4e-5,
      molarConductivity: 149,
      temperatureC: 25,
    });
    expect(hertz).toBeGreaterThan(10_000);
  });
});

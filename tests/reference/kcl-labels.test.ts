/**
 * What the labels 84, 147, 1413, 12 880 and 111 800 uS/cm stand for at 25 degC: common practice.
 * No open temperature table for 84 and 147 was found: the temperature values are an independent evaluation of the same scaled
 * limiting law; only their 0.01 mol/kg counterpart is measured (Pure Appl. Chem. 73 (2001) 1783).
 */
import { describe, expect, it } from 'vitest';
import { convertConcentration } from '../../shared/science/concentration.ts';
import { diluteKclConductivity, kclConcentrationAt25 } from '../../shared/science/kcl-solutions.ts';
import { kclStandardConductivity } from '../../shared/science/kcl-standards.ts';
import { relativeError } from './relative-error.ts';

describe('low standards', () => {
  it.each([
    [
      84,
      [
        [0, 45.96],
        [5, 53.03],
        [10, 60.39],
        [15, 68.02],
        [18, 72.72],
        [20, 75.9],
        [22, 79.11],
        [25, 84.0],
        [28, 88.96],
        [30, 92.3],
        [35, 100.78],
      ],
    ],
    [
      146.9,
      [
        [0, 80.41],
        [5, 92.76],
        [10, 105.63],
        [15, 118.97],
        [18, 127.18],
        [20, 132.74],
        [25, 146.9],
        [30, 161.41],
        [35, 176.22],
      ],
    ],
  ] as [number, [number, number][]][])(
    '%d uS/cm follows the scaled limiting law to two decimals',
    (label, rows) => {
      const concentrationMolL = kclConcentrationAt25(label);
      for (const [temperatureC, printed] of rows) {
        const { conductivityUsCm } = diluteKclConductivity({
          concentrationMolL,
          temperatureC,
          solventUsCm: 0,
        });
        expect(Math.abs(conductivityUsCm - printed)).toBeLessThan(0.0061);
      }
    },
  );

  it('84 uS/cm is 5.690e-4 mol/L and 146.93 is 0.001 mol/L', () => {
    expect(kclConcentrationAt25(84)).toBeCloseTo(5.69e-4, 7);
    expect(kclConcentrationAt25(146.931)).toBeCloseTo(1e-3, 8);
  });

  // 0.1 % from 0 to 50 degC, 0.05 % from 15 to 35 degC: what the model states as its uncertainty.
  it('the model reproduces the measured 0.01 mol/kg column', () => {
    const concentrationMolL = convertConcentration({
      value: 0.01,
      from: 'molal',
      to: 'molar',
      temperatureC: 25,
    });
    for (let temperatureC = 0; temperatureC <= 50; temperatureC += 5) {
      const model = diluteKclConductivity({
        concentrationMolL,
        temperatureC,
        solventUsCm: 0,
      }).conductivityUsCm;
      const measured = kclStandardConductivity({
        basis: 'molal',
        nominal: 0.01,
        temperatureC,
      }).conductivityUsCm;
      const isNear = temperatureC >= 15 && temperatureC <= 35;
      expect(relativeError(model, measured)).toBeLessThan(isNear ? 5e-4 : 1e-3);
    }
  });

  it('0.001 mol/kg is 146.5, not 146.9', () => {
    const c = convertConcentration({ value: 0.001, from: 'molal', to: 'molar', temperatureC: 25 });
    const { conductivityUsCm } = diluteKclConductivity({
      concentrationMolL: c,
      temperatureC: 25,
      solventUsCm: 0,
    });
    expect(Math.abs(conductivityUsCm - 146.5)).toBeLessThan(0.05);
  });
});

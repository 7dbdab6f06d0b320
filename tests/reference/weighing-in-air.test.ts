/**
 * Weighing in air: weights of 8000 kg/m3, air of 1.2 kg/m3 (OIML D 28, common practice); KCl of 1984 kg/m3 (from memory, high).
 * 76.6276 g in air for 76.5829 g in vacuo per 1000 g of water, for 1 demal: from memory, confidence medium.
 */
import { describe, expect, it } from 'vitest';
import { massFromReading, prepareKcl } from '../../shared/science/kcl-preparation.ts';
import { relativeError } from './relative-error.ts';

describe('buoyancy', () => {
  // Computed from the densities to six decimals.
  it.each([
    ['KCl', 1984, 1.000455],
    ['water', 998.2, 1.001053],
  ])('%s of %d kg/m3 weighs %d too little', (_, bodyDensityKgM3, factor) => {
    const mass = massFromReading({ readingG: 1, airDensityKgM3: 1.2, bodyDensityKgM3 });
    expect(Math.abs(mass - factor)).toBeLessThan(2e-6);
  });

  // 0.002 %: the recalled pair's ratio is 1.00058, computed 1.00060.
  it('turns 76.6276 g of KCl per 1000 g of water in air into 76.5829 g in vacuo', () => {
    const { kclMassG, waterMassG } = prepareKcl({
      kclReadingG: 76.6276,
      waterReadingG: 1000,
      airDensityKgM3: 1.2,
    });
    expect(relativeError((1000 * kclMassG) / waterMassG, 76.5829)).toBeLessThan(2e-5);
  });

  it('makes the demal definition in vacuo: 71.1352 g of KCl in 1000 g of solution is 1 D', () => {
    const { demal } = prepareKcl({ kclReadingG: 71.1352, waterReadingG: 1000 - 71.1352, airDensityKgM3: 0 });
    expect(relativeError(demal, 1)).toBeLessThan(1e-6);
  });
});

/** Checks of one reading, or of a few, against what is physically possible and what the probe's own settings imply. */
import { requireFinite, requireNonNegative, requirePositive, requireWithin } from './errors.ts';
import { pureWaterConductivity } from './water.ts';

/** Trace alkali can read slightly below pure water, so the floor keeps a margin [common practice]. */
const FLOOR_MARGIN = 0.02;

/** Raw probe temperatures outside this are a broken sensor, not a process [common practice]. */
const LOWEST_TEMPERATURE_C = -5;
const HIGHEST_TEMPERATURE_C = 150;

export type RangeReading = 'inside' | 'below' | 'above' | 'temperature-impossible';

/**
 * Gross range: the reading lies inside what sensor and water can give.
 * @param options.conductivityUsCm raw, µS/cm. options.temperatureC, °C.
 * @param options.lowestUsCm, options.highestUsCm range of the sensor, µS/cm, 0 or more.
 * @returns inside, below, above, or temperature-impossible (below -5 or above 150 °C).
 * @throws OutOfDomainError for a number that is not finite or a negative limit.
 * Accuracy: exact. Source: qartod; temperature limits common practice.
 * @example grossRange({ conductivityUsCm: 2500, temperatureC: 20, lowestUsCm: 0, highestUsCm: 2000 }) // 'above'
 */
export function grossRange(options: {
  conductivityUsCm: number;
  temperatureC: number;
  lowestUsCm: number;
  highestUsCm: number;
}): RangeReading {
  const { conductivityUsCm, temperatureC, lowestUsCm, highestUsCm } = options;
  requireFinite('conductivity', conductivityUsCm, 'µS/cm');
  requireFinite('temperature', temperatureC, '°C');
  requireNonNegative('lower end of the sensor', lowestUsCm, 'µS/cm');
  requireNonNegative('upper end of the sensor', highestUsCm, 'µS/cm');
  if (temperatureC < LOWEST_TEMPERATURE_C || temperatureC > HIGHEST_TEMPERATURE_C)
    return 'temperature-impossible';
  if (conductivityUsCm < lowestUsCm) return 'below';
  return conductivityUsCm > highestUsCm ? 'above' : 'inside';
}

/**
 * Physical floor: a raw reading below that of pure water at its temperature is an error of the probe, not a clean water.
 * kappa < kappa_water(t) (1 - 0.02).
 * @param options.conductivityUsCm raw, µS/cm. options.temperatureC 0 to 100 °C.
 * @returns true when the reading is impossible.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: that of pureWaterConductivity. Source: iapws-conductivity-1990; margin common practice.
 * @example isBelowPureWater({ conductivityUsCm: 0.1, temperatureC: 40 }) // true
 */
export function isBelowPureWater(options: { conductivityUsCm: number; temperatureC: number }): boolean {
  const { conductivityUsCm, temperatureC } = options;
  requireFinite('conductivity', conductivityUsCm, 'µS/cm');
  return conductivityUsCm < pureWaterConductivity(temperatureC) * (1 - FLOOR_MARGIN);
}

export type TemperatureFault = 'none' | 'jump' | 'differs-from-neighbour' | 'frozen';

/**
 * Temperature fault: the temperature sensor jumps, disagrees with a neighbour, or stands still while the conductivity moves.
 * jump: |dT/dt| > 2 °C/s; differs: |T - T_neighbour| > 2 °C; frozen: 10 or more readings without one step of change while the raw
 * conductivity ranges over more than 2 % of its middle.
 * @param options.temperaturesC at least one, °C. options.conductivitiesUsCm as many, raw, above 0. options.intervalS above 0, s.
 * @param options.neighbourC newest temperature of a neighbour in the same water, °C.
 * @returns the first fault found, or none.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: a water that changes without changing temperature can look frozen. Source: common practice.
 * @example temperatureFault({ temperaturesC: [20, 20.1, 45], conductivitiesUsCm: [900, 901, 900], intervalS: 5 }) // 'jump'
 */
export function temperatureFault(options: {
  temperaturesC: readonly number[];
  conductivitiesUsCm: readonly number[];
  intervalS: number;
  neighbourC?: number;
}): TemperatureFault {
  const { temperaturesC, conductivitiesUsCm, intervalS, neighbourC } = options;
  requirePositive('interval', intervalS, 's');
  temperaturesC.forEach((value) => requireFinite('temperature', value, '°C'));
  conductivitiesUsCm.forEach((value) => requirePositive('conductivity', value, 'µS/cm'));
  const fastest = 2 * intervalS;
  const jumped = temperaturesC.some((value, index) => {
    const before = index === 0 ? value : (temperaturesC[index - 1] as number);
    return Math.abs(value - before) > fastest;
  });
  if (jumped) return 'jump';
  const newest = temperaturesC.at(-1);
  if (neighbourC !== undefined && newest !== undefined) {
    requireFinite("neighbour's temperature", neighbourC, '°C');
    if (Math.abs(newest - neighbourC) > 2) return 'differs-from-neighbour';
  }
  const stoodStill = temperaturesC.length >= 10 && temperaturesC.every((value) => value === newest);
  const [lowest, highest] = [Math.min(...conductivitiesUsCm), Math.max(...conductivitiesUsCm)];
  const moved = conductivitiesUsCm.length > 0 && (highest - lowest) / ((highest + lowest) / 2) > 0.02;
  return stoodStill && moved ? 'frozen' : 'none';
}

/**
 * Compensation mismatch: the value a probe reports at its reference temperature does not follow from its raw reading and its settings.
 * |kappa_reported - kappa_raw/(1 + alpha (t - t_ref))| > resolution + 1e-4 of the value.
 * @param options.rawUsCm, options.reportedUsCm µS/cm, raw above 0. options.temperatureC °C.
 * @param options.coefficientPerK alpha, 0 to 0.1 per K, as approved for this probe. options.referenceC its own reference, °C.
 * @param options.resolutionUsCm one step of the reported value, 0 or more.
 * @returns the relative difference (reported over expected, less 1), and whether it is more than rounding explains.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-14. Source: iso-7888 (linear compensation); slack common practice.
 * @example compensationMismatch({ rawUsCm: 1273.03, reportedUsCm: 1557.8, temperatureC: 20, coefficientPerK: 0.0192, referenceC: 25, resolutionUsCm: 0.1 }).relativeDifference // ≈ 0.1062
 */
export function compensationMismatch(options: {
  rawUsCm: number;
  reportedUsCm: number;
  temperatureC: number;
  coefficientPerK: number;
  referenceC: number;
  resolutionUsCm: number;
}): { isMismatch: boolean; relativeDifference: number } {
  const { rawUsCm, reportedUsCm, temperatureC, coefficientPerK, referenceC, resolutionUsCm } = options;
  requirePositive('raw conductivity', rawUsCm, 'µS/cm');
  requireFinite('reported conductivity', reportedUsCm, 'µS/cm');
  requireFinite('temperature', temperatureC, '°C');
  requireFinite('reference temperature', referenceC, '°C');
  requireWithin('temperature coefficient', coefficientPerK, '1/K', 0, 0.1, '2 % per kelvin is written 0.02.');
  requireNonNegative('resolution', resolutionUsCm, 'µS/cm');
  const factor = requirePositive(
    'compensation factor',
    1 + coefficientPerK * (temperatureC - referenceC),
    '',
  );
  const expected = rawUsCm / factor;
  const difference = reportedUsCm - expected;
  return {
    isMismatch: Math.abs(difference) > resolutionUsCm + 1e-4 * expected,
    relativeDifference: difference / expected,
  };
}

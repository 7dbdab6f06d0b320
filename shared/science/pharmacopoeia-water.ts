/** The stage 1 conductivity limit for pharmaceutical waters: a table read down, never interpolated, on uncompensated values. */
import { RefusedModelError, requireNonNegative, requireWithin } from './errors.ts';
import { constant } from './references.ts';

const STAGE_ONE = constant(
  [0.6, 0.8, 0.9, 1.0, 1.1, 1.3, 1.4, 1.5, 1.7, 1.8, 1.9, 2.1, 2.2, 2.4, 2.5, 2.7, 2.7, 2.7, 2.7, 2.9, 3.1],
  'µS/cm at 0, 5, 10 ... 100 °C',
  'usp-645',
).value;
const STEP_C = constant(5, '°C', 'usp-645').value;

/**
 * Stage 1 limit at a measured temperature.
 *
 * the row whose temperature is not greater than the measured one
 *
 * @param temperatureC measured temperature, °C, 0 to 100
 * @returns highest conductivity that meets stage 1, µS/cm, uncompensated
 * @throws OutOfDomainError outside 0 to 100 °C
 * Accuracy: the table as printed.
 * Source: usp-645 (from memory, confidence high).
 * @example stageOneLimit(23) // 1.1
 */
export function stageOneLimit(temperatureC: number): number {
  requireWithin('temperature of the water', temperatureC, '°C', 0, 100);
  return STAGE_ONE[Math.floor(temperatureC / STEP_C)] as number;
}

/**
 * Whether a water meets stage 1.
 *
 * kappa <= limit(t)
 *
 * @param options.conductivityUsCm UNCOMPENSATED conductivity at temperatureC, µS/cm, 0 or more
 * @param options.temperatureC measured temperature, °C, 0 to 100
 * @param options.isCompensated true when the value was compensated, which the method forbids
 * @returns limit in µS/cm and whether it is met
 * @throws OutOfDomainError outside these ranges, RefusedModelError for a compensated value
 * Accuracy: the comparison is of the number as given, without a guard band.
 * Source: usp-645.
 * @example meetsStageOne({ conductivityUsCm: 1.2, temperatureC: 23 }).isMet // false
 */
export function meetsStageOne(options: {
  conductivityUsCm: number;
  temperatureC: number;
  isCompensated?: boolean;
}): { limitUsCm: number; isMet: boolean } {
  const conductivity = requireNonNegative('conductivity', options.conductivityUsCm, 'µS/cm');
  const limitUsCm = stageOneLimit(options.temperatureC);
  if (options.isCompensated === true) {
    throw new RefusedModelError({
      model: 'The stage 1 table',
      reason: 'it is for uncompensated values and this one is compensated',
      advice: 'Switch compensation off and measure again.',
    });
  }
  return { limitUsCm, isMet: conductivity <= limitUsCm };
}

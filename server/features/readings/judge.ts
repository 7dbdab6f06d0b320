/** What a raw reading means at its point: the value at the reference temperature, and how far it may be believed. */
import type { CompensationModelName } from '../../../shared/contracts/vocabulary.ts';
import { ScienceError } from '../../../shared/science/errors.ts';
import {
  toReferenceTemperature,
  type CompensationModel,
} from '../../../shared/science/temperature-compensation.ts';

export interface RawReading {
  conductivityUsCm: number | null;
  temperatureC: number | null;
}

/** How a point wants its readings stated. */
export interface PointCompensation {
  compensationModel: CompensationModelName;
  compensationCoefficientPercentPerK: number | null;
  referenceTemperatureC: number;
}

/** The last comparison with a reference solution that counts. */
export interface LastComparison {
  errorPercent: number;
  expandedUncertaintyPercent: number;
  coverageFactor: number;
}

export interface JudgedValue {
  valueUsCm: number | null;
  expandedUncertaintyUsCm: number | null;
}

/** Of the value on the screen [GUM 6.3.3: most often 2]. */
const coverageFactor = 2;
/** Step of the numerical derivative by temperature: small against any curvature, large against rounding. */
const stepC = 0.05;

export function compensationOf(point: PointCompensation): CompensationModel | null {
  const { compensationModel, compensationCoefficientPercentPerK, referenceTemperatureC } = point;
  if (compensationModel !== 'linear') return compensationModel;
  if (compensationCoefficientPercentPerK === null) return null;
  return {
    kind: 'linear',
    coefficientPerK: compensationCoefficientPercentPerK / 100,
    referenceC: referenceTemperatureC,
  };
}

/**
 * The raw value stated at the point's reference temperature by its model (natural water and ultrapure state it at
 * 25 °C). Null where there is nothing to state or the model does not hold: a wrong number would be worse.
 */
export function valueAtReference(reading: RawReading, point: PointCompensation | null): number | null {
  const { conductivityUsCm, temperatureC } = reading;
  if (conductivityUsCm === null || point === null) return null;
  const model = compensationOf(point);
  if (model === null) return null;
  if (model === 'none') return conductivityUsCm;
  if (temperatureC === null) return null;
  try {
    return toReferenceTemperature({ conductivityUsCm, temperatureC, model });
  } catch (error) {
    if (error instanceof ScienceError) return null;
    throw error;
  }
}

/** Change of the stated value with temperature at fixed raw conductivity, relative, per K. */
function temperatureSensitivityPerK(
  reading: RawReading,
  point: PointCompensation,
  valueUsCm: number,
): number {
  if (reading.temperatureC === null || valueUsCm === 0) return 0;
  const above = valueAtReference({ ...reading, temperatureC: reading.temperatureC + stepC }, point);
  const below = valueAtReference({ ...reading, temperatureC: reading.temperatureC - stepC }, point);
  if (above === null || below === null) return 0;
  return (above - below) / (2 * stepC) / valueUsCm;
}

/**
 * Value and expanded uncertainty of a live reading.
 *
 * U/x = |e| + k √((U_c/k_c)² + (s u_T)²), k = 2, where e is the error the last comparison found, U_c and k_c its
 * expanded uncertainty and coverage factor, s the relative change of the stated value per kelvin under the point's
 * model and u_T the standard uncertainty of the temperature. A live value is not corrected for e, therefore |e| is
 * added to U and not to the variance [GUM F.2.4.5]. Without a comparison nothing is known, and U is null.
 */
export function judgeReading(options: {
  reading: RawReading;
  point: PointCompensation | null;
  lastComparison: LastComparison | null;
  temperatureStandardUncertaintyC: number;
}): JudgedValue {
  const { reading, point, lastComparison, temperatureStandardUncertaintyC } = options;
  const valueUsCm = valueAtReference(reading, point);
  if (valueUsCm === null || point === null || lastComparison === null) {
    return { valueUsCm, expandedUncertaintyUsCm: null };
  }
  const comparison = lastComparison.expandedUncertaintyPercent / lastComparison.coverageFactor / 100;
  const temperature = temperatureSensitivityPerK(reading, point, valueUsCm) * temperatureStandardUncertaintyC;
  const relative =
    Math.abs(lastComparison.errorPercent) / 100 + coverageFactor * Math.hypot(comparison, temperature);
  return { valueUsCm, expandedUncertaintyUsCm: relative * valueUsCm };
}

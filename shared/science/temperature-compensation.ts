/**
 * What a conductivity would be at a reference temperature, by four models; and how to notice that somebody compensated already.
 *
 * A raw value is needed here: compensating a compensated value gives a number that belongs to no temperature.
 */
import { limitingMolarConductivity } from './electrolytes.ts';
import {
  InvalidInputError,
  OutOfDomainError,
  RefusedModelError,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from './errors.ts';
import { constant } from './references.ts';
import { pureWaterConductivity, pureWaterRelativeUncertainty, waterDensity } from './water.ts';

export type CompensationModel =
  | 'none'
  | 'natural-water'
  | 'ultrapure'
  | { kind: 'none' | 'natural-water' | 'ultrapure' }
  | { kind: 'linear'; coefficientPerK: number; referenceC: number };

const LOWEST_C = constant(-5, '°C', 'bench-practice').value;
const HIGHEST_C = constant(140, '°C', 'bench-practice').value;
const HIGHEST_COEFFICIENT = constant(0.1, 'per K', 'bench-practice').value;
/** Beyond this the straight line is further from any water than the correction it makes. */
const SMALLEST_FACTOR = constant(0.3, '', 'bench-practice').value;
/** Where pure water is more than this part of the conductivity, its own 5 %/K spoils a straight line by over 0.2 %/K. */
const PURE_WATER_SHARE_FOR_LINEAR = constant(0.05, '', 'bench-practice').value;
/** Ultrapure compensation treats what is not water as NaCl; beyond this the water's part no longer matters. */
const ULTRAPURE_LIMIT = constant(10, 'µS/cm', 'bench-practice').value;

const NATURAL = constant(
  { a: 0.962144, n: 0.965078, A: -0.198058, B: -1.992186, C: 231.17628, D: 86.39123, at20: 1.116 },
  't in °C',
  'iso-7888',
).value;
const NATURAL_LOWEST_C = constant(0, '°C', 'iso-7888').value;
const NATURAL_HIGHEST_C = constant(35.9, '°C', 'iso-7888').value;

/**
 * Factor that takes the conductivity of a natural water at t to 25 °C: kappa25 = f25 kappa(t).
 *
 * f25 = ((1 - a) + a nu^n) 1.116;  nu = A + exp(B + C/(t + D)), the viscosity of water in mm²/s
 *
 * @param temperatureC t, °C, 0 to 35.9
 * @returns factor, a pure number; 1.0004 at 25 °C, as the standard's equation has it
 * @throws OutOfDomainError outside 0 to 35.9 °C
 * Accuracy: the printed table within its last digit; for waters of the standard's kind (60 to 1000 µS/cm, mainly Ca HCO3).
 * Source: iso-7888.
 * @example naturalWaterFactor(10) // ≈ 1.4284
 */
export function naturalWaterFactor(temperatureC: number): number {
  const advice = 'The natural-water factor is not defined there: report the raw value, or use another model.';
  requireWithin(
    'temperature of the natural water',
    temperatureC,
    '°C',
    NATURAL_LOWEST_C,
    NATURAL_HIGHEST_C,
    advice,
  );
  const { a, n, A, B, C, D, at20 } = NATURAL;
  const viscosity = A + Math.exp(B + C / (temperatureC + D));
  return (1 - a + a * viscosity ** n) * at20;
}

/**
 * A linear coefficient restated for another reference temperature: 1.92 %/K at 25 °C is 2.12 %/K at 20 °C for the same solution.
 *
 * alpha' = alpha/(1 + alpha (T' - T))
 *
 * @param options.coefficientPerK alpha, per K, 0 to 0.1, referred to options.fromC
 * @param options.fromC T and options.toC T', reference temperatures, °C, 0 to 50
 * @returns coefficient referred to T', per K
 * @throws OutOfDomainError outside these ranges, or where the line has no conductivity left at T'
 * Accuracy: exact for a straight line.
 * Source: bench-practice; the straight line's definition.
 * @example restateCoefficient({ coefficientPerK: 0.0192, fromC: 25, toC: 20 }) // ≈ 0.02124
 */
export function restateCoefficient(options: { coefficientPerK: number; fromC: number; toC: number }): number {
  const { coefficientPerK, fromC, toC } = options;
  requireWithin('temperature coefficient', coefficientPerK, 'per K', 0, HIGHEST_COEFFICIENT);
  requireWithin('reference temperature', fromC, '°C', 0, 50);
  requireWithin('reference temperature', toC, '°C', 0, 50);
  return coefficientPerK / linearFactor(coefficientPerK, toC, fromC);
}

function linearFactor(coefficientPerK: number, temperatureC: number, referenceC: number): number {
  const factor = 1 + coefficientPerK * (temperatureC - referenceC);
  if (factor >= SMALLEST_FACTOR) return factor;
  throw new RefusedModelError({
    model: 'Linear compensation',
    reason: `${coefficientPerK} per K from ${referenceC} °C leaves a factor of ${factor} at ${temperatureC} °C`,
    advice: 'Measure nearer to the reference temperature.',
  });
}

/** A value below what pure water conducts cannot be water: the temperature, the cell constant or the wiring is wrong. */
function refuseLessThanPureWater(conductivityUsCm: number, temperatureC: number): number {
  const within = Math.min(Math.max(temperatureC, 0), 100);
  const pureWater = pureWaterConductivity(within);
  const lowest = pureWater * (1 - pureWaterRelativeUncertainty(within));
  if (conductivityUsCm >= lowest) return pureWater;
  throw new OutOfDomainError({
    quantity: `conductivity at ${temperatureC} °C`,
    value: conductivityUsCm,
    unit: 'µS/cm',
    lower: lowest,
    upper: null,
    advice:
      'Even pure water conducts more than that: check temperature, cell constant and wiring, and that the cell is full.',
  });
}

function byLinear(
  conductivityUsCm: number,
  temperatureC: number,
  coefficientPerK: number,
  referenceC: number,
): number {
  requireWithin('temperature coefficient', coefficientPerK, 'per K', 0, HIGHEST_COEFFICIENT);
  requireWithin('reference temperature', referenceC, '°C', 0, 50);
  const pureWater = refuseLessThanPureWater(conductivityUsCm, temperatureC);
  if (pureWater > PURE_WATER_SHARE_FOR_LINEAR * conductivityUsCm && temperatureC !== referenceC) {
    throw new RefusedModelError({
      model: 'Linear compensation',
      reason: `pure water makes up ${Math.round((100 * pureWater) / conductivityUsCm)} % of ${conductivityUsCm} µS/cm at ${temperatureC} °C and changes by 5 %/K`,
      advice: 'Use the ultrapure model.',
    });
  }
  return conductivityUsCm / linearFactor(coefficientPerK, temperatureC, referenceC);
}

/** What is not water is taken as sodium chloride, whose conductivity follows its limiting conductivity and the water's density. */
function impurityRatio(temperatureC: number): number {
  const limiting = limitingMolarConductivity({ salt: 'NaCl', temperatureC });
  const limitingAt25 = limitingMolarConductivity({ salt: 'NaCl', temperatureC: 25 });
  return (limiting * waterDensity(temperatureC)) / (limitingAt25 * waterDensity(25));
}

function byUltrapure(conductivityUsCm: number, temperatureC: number): number {
  requireWithin(
    'conductivity of ultrapure water',
    conductivityUsCm,
    'µS/cm',
    0,
    ULTRAPURE_LIMIT,
    'Use the linear model above.',
  );
  const pureWater = refuseLessThanPureWater(conductivityUsCm, temperatureC);
  const impurity = Math.max(0, conductivityUsCm - pureWater);
  return pureWaterConductivity(25) + impurity / impurityRatio(temperatureC);
}

/**
 * The conductivity a solution would have at the reference temperature of a model, from its RAW conductivity at t.
 *
 * none: kappa. linear: kappa/(1 + alpha (t - Tref)). natural-water: f25 kappa. ultrapure: kappa_w(25) + (kappa - kappa_w(t))
 * Lambda0(25) rho(25)/(Lambda0(t) rho(t)), Lambda0 of NaCl
 *
 * @param options.conductivityUsCm raw conductivity at temperatureC, µS/cm, at least that of pure water (none: 0 or more)
 * @param options.temperatureC temperature, °C: none and linear -5 to 140, natural-water 0 to 35.9, ultrapure 5 to 55
 * @param options.model 'none', 'natural-water', 'ultrapure', or { kind: 'linear', coefficientPerK (0 to 0.1 per K), referenceC (0 to 50 °C) }
 * @param options.isCompensated true when the value was compensated before it came here: every model but none refuses it
 * @param options.medium 'kcl-standard' for a reference solution, which the natural-water model refuses
 * @returns conductivity at the reference temperature (25 °C for natural-water and ultrapure), µS/cm
 * @throws OutOfDomainError outside these ranges or below pure water; RefusedModelError where a model does not describe the case
 * Accuracy: linear is as good as its coefficient, which holds for one solution and one span; natural-water 0.5 % for its waters;
 * ultrapure 2 % of the water's part away from 25 °C.
 * Source: iso-7888, iapws-conductivity-1990, harned-owen.
 * @example toReferenceTemperature({ conductivityUsCm: 1273.03, temperatureC: 20, model: { kind: 'linear', coefficientPerK: 0.0192, referenceC: 25 } }) // ≈ 1408.2
 * @example toReferenceTemperature({ conductivityUsCm: 100, temperatureC: 10, model: 'natural-water' }) // ≈ 142.84
 */
export function toReferenceTemperature(options: {
  conductivityUsCm: number;
  temperatureC: number;
  model: CompensationModel;
  isCompensated?: boolean;
  medium?: 'sample' | 'kcl-standard';
}): number {
  const { temperatureC, isCompensated = false, medium = 'sample' } = options;
  const model = typeof options.model === 'string' ? { kind: options.model } : options.model;
  const conductivity = requireNonNegative('conductivity', options.conductivityUsCm, 'µS/cm');
  requireWithin('temperature', temperatureC, '°C', LOWEST_C, HIGHEST_C);
  if (model.kind === 'none') return conductivity;
  if (isCompensated) {
    throw new RefusedModelError({
      model: 'Temperature compensation',
      reason: 'the value is compensated already',
      advice: 'Start from the raw value, or take the first compensation off with undoLinearCompensation.',
    });
  }
  if (model.kind === 'linear')
    return byLinear(conductivity, temperatureC, model.coefficientPerK, model.referenceC);
  if (model.kind === 'ultrapure') return byUltrapure(conductivity, temperatureC);
  if (model.kind === 'natural-water') return byNaturalWater(conductivity, temperatureC, medium);
  throw new InvalidInputError(`Unknown compensation model: use none, linear, natural-water or ultrapure.`);
}

function byNaturalWater(
  conductivityUsCm: number,
  temperatureC: number,
  medium: 'sample' | 'kcl-standard',
): number {
  if (medium === 'kcl-standard') {
    throw new RefusedModelError({
      model: 'The natural-water model',
      reason: 'a KCl solution is not a natural water (at 10 °C the factor would be 2.8 % wrong)',
      advice: 'Use the table of the reference solution.',
    });
  }
  const factor = naturalWaterFactor(temperatureC);
  refuseLessThanPureWater(conductivityUsCm, temperatureC);
  return factor * conductivityUsCm;
}

/**
 * The raw conductivity behind a value that an instrument compensated by a straight line.
 *
 * kappa(t) = kappa_ref (1 + alpha (t - Tref))
 *
 * @param options.conductivityUsCm compensated value, µS/cm, 0 or more
 * @param options.temperatureC temperature the instrument measured, °C, -5 to 140
 * @param options.coefficientPerK the instrument's alpha, per K, 0 to 0.1, and options.referenceC its reference temperature, °C, 0 to 50
 * @returns raw conductivity at temperatureC, µS/cm
 * @throws OutOfDomainError outside these ranges, RefusedModelError where the line has hardly any conductivity left
 * Accuracy: exact when alpha and reference are the instrument's own.
 * Source: the straight line's definition.
 * @example undoLinearCompensation({ conductivityUsCm: 1408.22, temperatureC: 20, coefficientPerK: 0.0192, referenceC: 25 }) // ≈ 1273.03
 */
export function undoLinearCompensation(options: {
  conductivityUsCm: number;
  temperatureC: number;
  coefficientPerK: number;
  referenceC: number;
}): number {
  const { temperatureC, coefficientPerK, referenceC } = options;
  const conductivity = requireNonNegative('conductivity', options.conductivityUsCm, 'µS/cm');
  requireWithin('temperature', temperatureC, '°C', LOWEST_C, HIGHEST_C);
  requireWithin('temperature coefficient', coefficientPerK, 'per K', 0, HIGHEST_COEFFICIENT);
  requireWithin('reference temperature', referenceC, '°C', 0, 50);
  return conductivity * linearFactor(coefficientPerK, temperatureC, referenceC);
}

export type CompensationState =
  'uncompensated' | 'compensated-once' | 'compensated-twice' | 'not-recognised' | 'cannot-tell';

/**
 * How often a reading taken in a known solution was compensated: the test for double compensation.
 *
 * compares indicated/kappa(t) with 1, 1/f and 1/f², f = 1 + alpha (t - Tref)
 *
 * @param options.indicatedUsCm what the instrument shows, µS/cm, above 0
 * @param options.referenceUsCm true conductivity of the solution AT temperatureC, µS/cm, above 0
 * @param options.temperatureC temperature of the solution, °C, -5 to 140
 * @param options.coefficientPerK per K, 0 to 0.1, and options.referenceC, °C, 0 to 50, of the compensation suspected
 * @param options.relativeTolerance how far reading and solution may differ for other reasons, 0.02 unless given, above 0
 * @returns uncompensated, compensated-once, compensated-twice, not-recognised (none of the three fits), or cannot-tell (too near
 *   the reference temperature for the three to differ by more than twice the tolerance)
 * @throws OutOfDomainError outside these ranges
 * Accuracy: a classification; move the solution 5 K away from the reference temperature to make it sharp.
 * Source: bench-practice.
 * @example recogniseCompensation({ indicatedUsCm: 1557.8, referenceUsCm: 1273.03, temperatureC: 20, coefficientPerK: 0.0192, referenceC: 25 }) // "compensated-twice"
 */
export function recogniseCompensation(options: {
  indicatedUsCm: number;
  referenceUsCm: number;
  temperatureC: number;
  coefficientPerK: number;
  referenceC: number;
  relativeTolerance?: number;
}): CompensationState {
  const { temperatureC, coefficientPerK, referenceC, relativeTolerance = 0.02 } = options;
  const indicated = requirePositive('indicated conductivity', options.indicatedUsCm, 'µS/cm');
  const reference = requirePositive('reference conductivity', options.referenceUsCm, 'µS/cm');
  const tolerance = requirePositive('relative tolerance', relativeTolerance, '');
  const factor = undoLinearCompensation({ conductivityUsCm: 1, temperatureC, coefficientPerK, referenceC });
  if (Math.abs(Math.log(factor)) <= 2 * tolerance) return 'cannot-tell';
  const states = ['uncompensated', 'compensated-once', 'compensated-twice'] as const;
  const found = states.find(
    (_, times) => Math.abs(Math.log((indicated / reference) * factor ** times)) <= tolerance,
  );
  return found ?? 'not-recognised';
}

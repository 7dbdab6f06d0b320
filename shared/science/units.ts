/** Units of conductivity, resistivity, conductance, cell constant and molar conductivity, turned into the ones used inside. */
import { InvalidInputError, requireFinite, requirePositive } from './errors.ts';

/** What one of each unit is in µS/cm. 1 mS/m is 10 µS/cm, not 1000. */
const CONDUCTIVITY_IN_US_CM = {
  'uS/cm': 1,
  'mS/cm': 1e3,
  'S/cm': 1e6,
  'uS/m': 0.01,
  'mS/m': 10,
  'S/m': 1e4,
} as const;
export type ConductivityUnit = keyof typeof CONDUCTIVITY_IN_US_CM;
export const conductivityUnits = Object.keys(CONDUCTIVITY_IN_US_CM) as ConductivityUnit[];

/** What one of each unit is in ohm cm. */
const RESISTIVITY_IN_OHM_CM = { 'ohm cm': 1, 'kohm cm': 1e3, 'Mohm cm': 1e6, 'ohm m': 100 } as const;
export type ResistivityUnit = keyof typeof RESISTIVITY_IN_OHM_CM;
export const resistivityUnits = Object.keys(RESISTIVITY_IN_OHM_CM) as ResistivityUnit[];

/** What one of each unit is in µS. */
const CONDUCTANCE_IN_US = { uS: 1, mS: 1e3, S: 1e6 } as const;
export type ConductanceUnit = keyof typeof CONDUCTANCE_IN_US;
export const conductanceUnits = Object.keys(CONDUCTANCE_IN_US) as ConductanceUnit[];

function factor<Unit extends string>(
  table: Readonly<Record<Unit, number>>,
  unit: Unit,
  quantity: string,
): number {
  if (Object.hasOwn(table, unit)) return table[unit];
  throw new InvalidInputError(`Unknown unit of ${quantity} ${unit}: use ${Object.keys(table).join(', ')}.`);
}

/**
 * A conductivity in another unit.
 *
 * value x (from in µS/cm)/(to in µS/cm)
 *
 * @param options.value conductivity, in `from`; any finite number (a difference may be negative)
 * @param options.from and options.to one of conductivityUnits
 * @returns conductivity in `to`
 * @throws OutOfDomainError for a value that is not finite, InvalidInputError for an unknown unit
 * Accuracy: exact.
 * Source: SI.
 * @example convertConductivity({ value: 1413, from: 'uS/cm', to: 'mS/m' }) // ≈ 141.3
 */
export function convertConductivity(options: {
  value: number;
  from: ConductivityUnit;
  to: ConductivityUnit;
}): number {
  const { value, from, to } = options;
  requireFinite('conductivity', value, from);
  return (
    (value * factor(CONDUCTIVITY_IN_US_CM, from, 'conductivity')) /
    factor(CONDUCTIVITY_IN_US_CM, to, 'conductivity')
  );
}

/**
 * The resistivity of a liquid from its conductivity.
 *
 * rho = 1/kappa; 1 µS/cm is 1 000 000 ohm cm
 *
 * @param options.conductivityUsCm conductivity, µS/cm, above 0
 * @param options.unit one of resistivityUnits, 'Mohm cm' unless given
 * @returns resistivity in that unit
 * @throws OutOfDomainError when the conductivity is not above 0, InvalidInputError for an unknown unit
 * Accuracy: exact.
 * Source: SI.
 * @example resistivityFromConductivity({ conductivityUsCm: 0.055 }) // ≈ 18.18
 */
export function resistivityFromConductivity(options: {
  conductivityUsCm: number;
  unit?: ResistivityUnit;
}): number {
  const { unit = 'Mohm cm' } = options;
  const conductivity = requirePositive('conductivity', options.conductivityUsCm, 'µS/cm');
  return 1e6 / conductivity / factor(RESISTIVITY_IN_OHM_CM, unit, 'resistivity');
}

/**
 * The conductivity of a liquid from its resistivity.
 *
 * kappa = 1/rho
 *
 * @param options.resistivity resistivity in `unit`, above 0
 * @param options.unit one of resistivityUnits, 'Mohm cm' unless given
 * @returns conductivity, µS/cm
 * @throws OutOfDomainError when the resistivity is not above 0, InvalidInputError for an unknown unit
 * Accuracy: exact.
 * Source: SI.
 * @example conductivityFromResistivity({ resistivity: 18.18, unit: 'Mohm cm' }) // ≈ 0.05501
 */
export function conductivityFromResistivity(options: {
  resistivity: number;
  unit?: ResistivityUnit;
}): number {
  const { unit = 'Mohm cm' } = options;
  const resistivity = requirePositive('resistivity', options.resistivity, unit);
  return 1e6 / (resistivity * factor(RESISTIVITY_IN_OHM_CM, unit, 'resistivity'));
}

/**
 * A conductance in another unit.
 *
 * value x (from in µS)/(to in µS)
 *
 * @param options.value conductance, in `from`
 * @param options.from and options.to one of conductanceUnits
 * @returns conductance in `to`
 * @throws OutOfDomainError for a value that is not finite, InvalidInputError for an unknown unit
 * Accuracy: exact.
 * Source: SI.
 * @example convertConductance({ value: 1.392, from: 'mS', to: 'uS' }) // ≈ 1392
 */
export function convertConductance(options: {
  value: number;
  from: ConductanceUnit;
  to: ConductanceUnit;
}): number {
  const { value, from, to } = options;
  requireFinite('conductance', value, from);
  return (
    (value * factor(CONDUCTANCE_IN_US, from, 'conductance')) / factor(CONDUCTANCE_IN_US, to, 'conductance')
  );
}

/**
 * The conductance that a resistance shows.
 *
 * G = 1/R
 *
 * @param resistanceOhm resistance, ohm, above 0
 * @returns conductance, µS
 * @throws OutOfDomainError when the resistance is not above 0
 * Accuracy: exact.
 * Source: SI.
 * @example conductanceFromResistance(718.39) // ≈ 1392.0
 */
export function conductanceFromResistance(resistanceOhm: number): number {
  return 1e6 / requirePositive('resistance', resistanceOhm, 'Ω');
}

/**
 * A cell constant stated per metre, per centimetre.
 *
 * 1 cm⁻¹ = 100 m⁻¹
 *
 * @param cellConstantPerM cell constant, m⁻¹, above 0
 * @returns cell constant, cm⁻¹
 * @throws OutOfDomainError when it is not above 0
 * Accuracy: exact.
 * Source: SI.
 * @example cellConstantFromPerMetre(101) // ≈ 1.01
 */
export function cellConstantFromPerMetre(cellConstantPerM: number): number {
  return requirePositive('cell constant', cellConstantPerM, 'm⁻¹') / 100;
}

/**
 * Conductivity from molar conductivity and concentration.
 *
 * kappa[µS/cm] = 1000 Lambda[S cm²/mol] c[mol/L]; per equivalent with equivalents per litre alike, never mixed
 *
 * @param options.molarConductivity S·cm²/mol (or per equivalent), 0 or more
 * @param options.concentrationMolL mol/L (or equivalents per litre), 0 or more
 * @returns conductivity, µS/cm
 * @throws OutOfDomainError for a value that is not finite
 * Accuracy: exact.
 * Source: definition of molar conductivity.
 * @example conductivityFromMolar({ molarConductivity: 141.257, concentrationMolL: 0.01 }) // ≈ 1412.57
 */
export function conductivityFromMolar(options: {
  molarConductivity: number;
  concentrationMolL: number;
}): number {
  requireFinite('molar conductivity', options.molarConductivity, 'S·cm²/mol');
  requireFinite('concentration', options.concentrationMolL, 'mol/L');
  return 1000 * options.molarConductivity * options.concentrationMolL;
}

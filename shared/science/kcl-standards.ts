/** Conductivity of the KCl reference solutions on their three bases, at any temperature of their tables. */
import { cubicSpline, evaluateSpline } from './cubic-spline.ts';
import type { Spline } from './cubic-spline.ts';
import { InvalidInputError, requireNonNegative, requireWithin } from './errors.ts';
import {
  CO2_SATURATED_WATER,
  DEMAL_RELATIVE_STANDARD_UNCERTAINTY,
  DEMAL_TABLE,
  JONES_BRADSHAW_INTERNATIONAL,
  MOLAL_INTERPOLATION_HALF_WIDTH,
  MOLAL_RELATIVE_STANDARD_UNCERTAINTY,
  MOLAL_TABLE,
  MOLAR_AT_25,
  MOLAR_RELATIVE_STANDARD_UNCERTAINTY,
} from './kcl-tables.ts';
import type { KclBasis, KclNominal } from './kcl-tables.ts';
import { constant } from './references.ts';
import type { ReferenceKey } from './references.ts';

export type { KclBasis, KclNominal } from './kcl-tables.ts';

type Rows = readonly (readonly [number, number])[];
type ValueAndSlope = { value: number; slope: number };

const LOWEST_C = constant(0, '°C', 'pratt-2001').value;
const HIGHEST_C = constant(50, '°C', 'pratt-2001').value;

const splineThrough = (rows: Rows): Spline =>
  cubicSpline(
    rows.map(([temperature]) => temperature),
    rows.map(([, conductivity]) => conductivity),
  );

const MOLAL: Readonly<Record<KclNominal, Spline>> = {
  0.01: splineThrough(MOLAL_TABLE[0.01]),
  0.1: splineThrough(MOLAL_TABLE[0.1]),
  1: splineThrough(MOLAL_TABLE[1]),
};
const CO2_WATER = splineThrough(CO2_SATURATED_WATER);

/** Demal over molal conductivity at the demal table's three temperatures: a smooth ratio, so straight lines suffice between. */
function demalRatios(nominal: KclNominal): Spline[] {
  const nodes = DEMAL_TABLE[nominal].map(
    ([t, conductivity]) => [t, conductivity / evaluateSpline(MOLAL[nominal], t).value] as const,
  );
  const [cold, middle, warm] = nodes as [
    readonly [number, number],
    readonly [number, number],
    readonly [number, number],
  ];
  return [splineThrough([cold, middle]), splineThrough([middle, warm])];
}
const DEMAL_RATIO: Readonly<Record<KclNominal, Spline[]>> = {
  0.01: demalRatios(0.01),
  0.1: demalRatios(0.1),
  1: demalRatios(1),
};
const MIDDLE_NODE_C = 18;

/** Above 25 °C, the demal table's last row, the ratio is held. */
function demalRatio(nominal: KclNominal, temperatureC: number): ValueAndSlope {
  const [cold, warm] = DEMAL_RATIO[nominal] as [Spline, Spline];
  if (temperatureC > 25) return { value: evaluateSpline(warm, 25).value, slope: 0 };
  return evaluateSpline(temperatureC < MIDDLE_NODE_C ? cold : warm, temperatureC);
}

function demal(nominal: KclNominal, temperatureC: number): ValueAndSlope {
  const base = evaluateSpline(MOLAL[nominal], temperatureC);
  const ratio = demalRatio(nominal, temperatureC);
  return { value: base.value * ratio.value, slope: base.slope * ratio.value + base.value * ratio.slope };
}

/** The molar solutions keep the demal ones' shape: their molalities differ by 0.5 % at most. */
function molar(nominal: KclNominal, temperatureC: number): ValueAndSlope {
  const shape = demal(nominal, temperatureC);
  const scale = MOLAR_AT_25[nominal].value / demal(nominal, 25).value;
  return { value: shape.value * scale, slope: shape.slope * scale };
}

/** How fast the demal ratio still moves at 25 °C is what holding it above may cost (half-width). */
function heldRatioUncertainty(nominal: KclNominal, temperatureC: number): number {
  if (temperatureC <= 25) return 0;
  const [cold, warm] = DEMAL_RATIO[nominal] as [Spline, Spline];
  const overall = (evaluateSpline(warm, 25).value - evaluateSpline(cold, 0).value) / 25;
  return (Math.abs(overall) * (temperatureC - 25)) / Math.sqrt(3);
}

function relativeUncertainty(basis: KclBasis, nominal: KclNominal, temperatureC: number): number {
  if (basis === 'molal') return MOLAL_RELATIVE_STANDARD_UNCERTAINTY[nominal];
  const table = basis === 'demal' ? DEMAL_RELATIVE_STANDARD_UNCERTAINTY : MOLAR_RELATIVE_STANDARD_UNCERTAINTY;
  return Math.hypot(table, heldRatioUncertainty(nominal, temperatureC));
}

const CURVE = { molal: (nominal: KclNominal, t: number) => evaluateSpline(MOLAL[nominal], t), demal, molar };

function sourceOf(basis: KclBasis, nominal: KclNominal): ReferenceKey {
  if (basis === 'molal') return 'pratt-2001';
  return basis === 'demal' ? 'oiml-r56' : MOLAR_AT_25[nominal].source;
}

function requireStandard(basis: KclBasis, nominal: KclNominal): void {
  if (!Object.hasOwn(CURVE, basis)) {
    throw new InvalidInputError(`Unknown basis ${String(basis)}: use molal, demal or molar.`);
  }
  if (!Object.hasOwn(MOLAL, nominal)) {
    throw new InvalidInputError(`No ${basis} KCl table for ${String(nominal)}: use 0.01, 0.1 or 1.`);
  }
}

export type KclStandardConductivity = {
  /** With `solventUsCm` added; without it the water's own conductivity is not in the value. */
  conductivityUsCm: number;
  relativeStandardUncertainty: number;
  source: ReferenceKey;
  /** Change with temperature, µS/cm per K. */
  slopeUsCmPerK: number;
  /** Largest error of reading between the table's rows, relative, half-width. */
  interpolationRelativeHalfWidth: number;
  solventUsCm: number;
};

/**
 * Conductivity of a KCl reference solution: basis and nominal value together, never the number alone.
 *
 * molal: cubic spline through the 2001 table, 0 to 50 °C. demal: molal(t) times the ratio of the demal to the molal table, linear
 * between 0, 18 and 25 °C and held above. molar: demal shape scaled to the 25 °C value of the solution in mol/L.
 *
 * @param options.basis molal (mol/kg of water), demal (by mass, 1 mol/dm³ at 0 °C) or molar (mol/L at 25 °C)
 * @param options.nominal 0.01, 0.1 or 1 of that basis
 * @param options.temperatureC temperature, °C (ITS-90), 0 to 50
 * @param options.solventUsCm conductivity of the water used, at that temperature, added to the salt's; 0 unless given, µS/cm
 * @returns conductivity in µS/cm, its relative standard uncertainty, its source, slope in µS/cm per K and interpolation error
 * @throws OutOfDomainError outside 0 to 50 °C, InvalidInputError for an unknown basis or nominal
 * Accuracy (k = 1): molal 0.03 % (0.01) and 0.04 % (0.1, 1); demal 0.05 % to 25 °C, 0.1 % at 50 °C; molar 0.1 %. Interpolation 9 ppm
 * (0.01, 0.1), 50 ppm (1).
 * Source: pratt-2001 (molal), oiml-r56 (demal), juhasz-marsh-1981, crc-equivalent-conductivity, kohlrausch-holborn (molar).
 * @example kclStandardConductivity({ basis: 'molal', nominal: 0.01, temperatureC: 25 }).conductivityUsCm // 1408.23
 * @example kclStandardConductivity({ basis: 'demal', nominal: 0.01, temperatureC: 25 }).conductivityUsCm // ≈ 1408.3
 * @example kclStandardConductivity({ basis: 'molar', nominal: 0.01, temperatureC: 25 }).conductivityUsCm // ≈ 1412.57
 */
export function kclStandardConductivity(options: {
  basis: KclBasis;
  nominal: KclNominal;
  temperatureC: number;
  solventUsCm?: number;
}): KclStandardConductivity {
  const { basis, nominal, temperatureC, solventUsCm = 0 } = options;
  requireStandard(basis, nominal);
  requireWithin('temperature of the KCl solution', temperatureC, '°C', LOWEST_C, HIGHEST_C);
  requireNonNegative('conductivity of the water', solventUsCm, 'µS/cm');
  const { value, slope } = CURVE[basis](nominal, temperatureC);
  return {
    conductivityUsCm: value + solventUsCm,
    relativeStandardUncertainty: relativeUncertainty(basis, nominal, temperatureC),
    source: sourceOf(basis, nominal),
    slopeUsCmPerK: slope,
    interpolationRelativeHalfWidth: MOLAL_INTERPOLATION_HALF_WIDTH[nominal],
    solventUsCm,
  };
}

/**
 * Conductivity of water in equilibrium with the carbon dioxide of the air: what an open bottle tends to gain.
 *
 * cubic spline through the column printed beside the molal table
 *
 * @param temperatureC temperature, °C, 0 to 50
 * @returns conductivity, µS/cm (1.10 at 25 °C)
 * @throws OutOfDomainError outside 0 to 50 °C
 * Accuracy: 0.01 µS/cm of the table; today's air (0.042 % CO2) gives about 1.00 at 25 °C, a crowded room 1.5.
 * Source: pratt-2001.
 * @example carbonDioxideWaterConductivity(25) // ≈ 1.10
 */
export function carbonDioxideWaterConductivity(temperatureC: number): number {
  requireWithin('temperature of the water', temperatureC, '°C', LOWEST_C, HIGHEST_C);
  return evaluateSpline(CO2_WATER, temperatureC).value;
}

const UNIT_OF: Readonly<Record<KclBasis, string>> = {
  molal: 'mol/kg (molal)',
  demal: 'D (demal)',
  molar: 'mol/L at 25 °C (molar)',
};

/**
 * The name of a KCl reference solution that cannot be mistaken for another basis: nominal, basis and value.
 *
 * @param options.basis and options.nominal as kclStandardConductivity
 * @returns text
 * @throws InvalidInputError for an unknown basis or nominal
 * Accuracy: the value is rounded to 0.01 µS/cm.
 * Source: as kclStandardConductivity.
 * @example kclStandardLabel({ basis: 'molal', nominal: 0.01 }) // "KCl 0.01 mol/kg (molal), 1408.23 µS/cm at 25 °C"
 */
export function kclStandardLabel({ basis, nominal }: { basis: KclBasis; nominal: KclNominal }): string {
  const { conductivityUsCm } = kclStandardConductivity({ basis, nominal, temperatureC: 25 });
  return `KCl ${nominal} ${UNIT_OF[basis]}, ${Math.round(conductivityUsCm * 100) / 100} µS/cm at 25 °C`;
}

const ABSOLUTE_PER_INTERNATIONAL = constant(
  0.999505,
  'S(absolute) per S(international)',
  'international-ohm-1948',
).value;

/**
 * A conductivity stated on the international ohm (in use until 1948), in today's unit.
 *
 * kappa(absolute) = 0.999505 kappa(international)
 *
 * @param conductivityUsCm conductivity on the international ohm, µS/cm, 0 or more
 * @returns conductivity, µS/cm
 * @throws OutOfDomainError for a negative or non-finite value
 * Accuracy: 1e-6. The other way round it would be wrong by 0.1 %.
 * Source: international-ohm-1948.
 * @example absoluteFromInternationalOhm(1408.77) // ≈ 1408.07
 */
export function absoluteFromInternationalOhm(conductivityUsCm: number): number {
  return requireNonNegative('conductivity', conductivityUsCm, 'µS/cm') * ABSOLUTE_PER_INTERNATIONAL;
}

/**
 * The demal values of 1933 in today's unit, for comparing with old certificates; the demal basis itself uses OIML R 56.
 *
 * kappa = 0.999505 kappa(printed)
 *
 * @param options.nominal 0.01, 0.1 or 1 demal
 * @param options.temperatureC 0, 18 or 25 °C, the three that were measured
 * @returns conductivity, µS/cm, absolute ohm
 * @throws InvalidInputError for another nominal or temperature
 * Accuracy: 0.02 % from the 1981 table at 18 and 25 °C, which is what a change of temperature scale would give.
 * Source: jones-bradshaw-1933.
 * @example jonesBradshawConductivity({ nominal: 0.1, temperatureC: 25 }) // ≈ 12849.6
 */
export function jonesBradshawConductivity(options: {
  nominal: KclNominal;
  temperatureC: 0 | 18 | 25;
}): number {
  requireStandard('demal', options.nominal);
  const row = JONES_BRADSHAW_INTERNATIONAL[options.nominal].find(([t]) => t === options.temperatureC);
  if (row === undefined) throw new InvalidInputError('The 1933 values exist at 0, 18 and 25 °C only.');
  return absoluteFromInternationalOhm(row[1]);
}

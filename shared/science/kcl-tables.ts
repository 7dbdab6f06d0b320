/**
 * Tables of the conductivity of KCl solutions, as printed. Temperatures in °C, conductivities in µS/cm.
 *
 * Three bases share the numbers 0.01, 0.1 and 1 and differ by 0.3 % to 3 %: moles per kilogram of water (molal),
 * demal (made by mass, 1 mol per dm³ at 0 °C) and moles per litre of solution (molar).
 */
import { constant } from './references.ts';

export type KclBasis = 'molal' | 'demal' | 'molar';
export type KclNominal = 0.01 | 0.1 | 1;

/** Molal: ITS-90, absolute ohm, the water's own conductivity SUBTRACTED. There is no row for 1 mol/kg at 18 °C. */
export const MOLAL_TABLE = constant(
  {
    0.01: [
      [0, 772.92],
      [5, 890.96],
      [10, 1013.95],
      [15, 1141.45],
      [18, 1219.93],
      [20, 1273.03],
      [25, 1408.23],
      [30, 1546.63],
      [35, 1687.79],
      [40, 1831.27],
      [45, 1976.62],
      [50, 2123.43],
    ],
    0.1: [
      [0, 7116.85],
      [5, 8183.7],
      [10, 9291.72],
      [15, 10437.1],
      [18, 11140.6],
      [20, 11615.9],
      [25, 12824.6],
      [30, 14059.2],
      [35, 15316.0],
      [40, 16591.0],
      [45, 17880.6],
      [50, 19180.9],
    ],
    1: [
      [0, 63488],
      [5, 72030],
      [10, 80844],
      [15, 89900],
      [20, 99170],
      [25, 108620],
      [30, 118240],
      [35, 127970],
      [40, 137810],
      [45, 147720],
      [50, 157670],
    ],
  } satisfies Record<KclNominal, readonly (readonly [number, number])[]>,
  '°C, µS/cm',
  'pratt-2001',
).value;

/** Stated uncertainty, read as k = 1 because the reprint gives no coverage: if it was k = 2, we claim too much, never too little. */
export const MOLAL_RELATIVE_STANDARD_UNCERTAINTY = constant(
  { 0.01: 3e-4, 0.1: 4e-4, 1: 4e-4 },
  'relative',
  'pratt-2001',
).value;

/** Leave-one-out splines reproduce every inner row this closely (half-width); 1 mol/kg lacks its 18 °C row. */
export const MOLAL_INTERPOLATION_HALF_WIDTH = constant(
  { 0.01: 9e-6, 0.1: 9e-6, 1: 5e-5 },
  'relative',
  'pratt-2001',
).value;

/** Water in equilibrium with the CO2 of the air, printed beside the molal table for those who add the solvent back. */
export const CO2_SATURATED_WATER = constant(
  [
    [0, 0.58],
    [5, 0.68],
    [10, 0.79],
    [15, 0.89],
    [18, 0.95],
    [20, 0.99],
    [25, 1.1],
    [30, 1.2],
    [35, 1.3],
    [40, 1.4],
    [45, 1.51],
    [50, 1.61],
  ],
  '°C, µS/cm',
  'pratt-2001',
).value;

/** Demal, absolute ohm. At 25 °C the table was read second-hand; at 0 and 18 °C it is from memory, confidence medium. */
export const DEMAL_TABLE = constant(
  {
    0.01: [
      [0, 773.3],
      [18, 1220.1],
      [25, 1408.3],
    ],
    0.1: [
      [0, 7134],
      [18, 11163],
      [25, 12852],
    ],
    1: [
      [0, 65140],
      [18, 97810],
      [25, 111310],
    ],
  } satisfies Record<KclNominal, readonly (readonly [number, number])[]>,
  '°C, µS/cm',
  'oiml-r56',
).value;

/** Grams of KCl per 1000 g of solution, in vacuo: what 0.01, 0.1 and 1 demal ARE. */
export const DEMAL_GRAMS_PER_KILOGRAM = constant(
  { 0.01: 0.745263, 0.1: 7.41913, 1: 71.1352 },
  'g/kg',
  'oiml-r56',
).value;

/**
 * Relative standard uncertainty of a demal value: the four figures of the table and what two other lineages say.
 * It differs from the same solution reached through the molal table by up to 0.04 % (0.01 D at 0 and at 25 °C).
 */
export const DEMAL_RELATIVE_STANDARD_UNCERTAINTY = constant(5e-4, 'relative', 'oiml-r56').value;

/** Demal on the INTERNATIONAL ohm: not usable before absoluteFromInternationalOhm. */
export const JONES_BRADSHAW_INTERNATIONAL = constant(
  {
    0.01: [
      [0, 773.64],
      [18, 1220.52],
      [25, 1408.77],
    ],
    0.1: [
      [0, 7137.9],
      [18, 11166.7],
      [25, 12856.0],
    ],
    1: [
      [0, 65176],
      [18, 97838],
      [25, 111342],
    ],
  } satisfies Record<KclNominal, readonly (readonly [number, number])[]>,
  '°C, µS/cm on the international ohm',
  'jones-bradshaw-1933',
).value;

/**
 * Molar, mol/L at 25 °C, absolute ohm. Sources disagree: labels of bottles say 1413 (0.01; the equation 1412.57), 12 880 or 12 890
 * (0.1; the older value is 0.08 % lower) and 111 800 or 111 900 (1). For 1 mol/L the lower one stands here because the only table
 * with temperatures belongs to it; the uncertainty covers both.
 */
export const MOLAR_AT_25 = {
  0.01: constant(1412.57, 'µS/cm', 'juhasz-marsh-1981'),
  0.1: constant(12890, 'µS/cm', 'crc-equivalent-conductivity'),
  1: constant(111800, 'µS/cm', 'kohlrausch-holborn'),
} as const;

/** A flask filled at 20 °C holds 0.12 % less per litre at 25 °C; labels rarely say which was meant. */
export const MOLAR_RELATIVE_STANDARD_UNCERTAINTY = constant(1e-3, 'relative', 'bench-practice').value;

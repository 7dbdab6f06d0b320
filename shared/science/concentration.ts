/** Amount of KCl in a solution on its three bases, joined by the density of the solution. */
import { InvalidInputError, requireWithin } from './errors.ts';
import { DEMAL_GRAMS_PER_KILOGRAM } from './kcl-tables.ts';
import { constant } from './references.ts';
import { waterDensity } from './water.ts';

const MOLAR_MASS_K = constant(39.0983, 'g/mol', 'iupac-atomic-weights').value;
const MOLAR_MASS_CL = constant(35.453, 'g/mol', 'iupac-atomic-weights').value;
/** Molar mass of KCl, g/mol. */
export const KCL_MOLAR_MASS = MOLAR_MASS_K + MOLAR_MASS_CL;

const APPARENT_VOLUME = constant(
  { c0: -0.855928946, c1: 6.040735713, c2: 2.817874162, c3: 0.02539246459, c4: 2681.617234659 },
  'm³/kg of KCl, t in °C',
  'laliberte-2009',
).value;
const HIGHEST_MASS_FRACTION = constant(0.25, 'mass fraction', 'laliberte-2009').value;

/**
 * Density of an aqueous KCl solution at 0.1 MPa.
 *
 * 1/rho = (1 - w)/rho_water + w v;  v = (w + c2 + c3 t)/((c0 w + c1) exp(1e-6 (t + c4)²)), m³/kg
 *
 * @param options.massFraction w, mass of KCl per mass of solution, 0 to 0.25
 * @param options.temperatureC t, °C, 0 to 95 (fitted from 5 °C; carried to 0 °C for demal, with 0.08 % at 1 mol/L)
 * @returns density, kg/m³
 * @throws OutOfDomainError outside these ranges
 * Accuracy: 0.02 % from 5 °C.
 * Source: laliberte-2009.
 * @example kclSolutionDensity({ massFraction: 0.0711352, temperatureC: 25 }) // ≈ 1042.52
 */
export function kclSolutionDensity(options: { massFraction: number; temperatureC: number }): number {
  const w = requireWithin('mass fraction of KCl', options.massFraction, '', 0, HIGHEST_MASS_FRACTION);
  const t = requireWithin('temperature of the KCl solution', options.temperatureC, '°C', 0, 95);
  const { c0, c1, c2, c3, c4 } = APPARENT_VOLUME;
  const apparentVolume = (w + c2 + c3 * t) / ((c0 * w + c1) * Math.exp(1e-6 * (t + c4) ** 2));
  return 1 / ((1 - w) / waterDensity(t) + w * apparentVolume);
}

/** Demal per mass fraction is the density at 0 °C over the molar mass: smooth, so a parabola through the three defined masses is exact to ppm. */
const DEMAL_NODES = ([0.01, 0.1, 1] as const).map(
  (demal) => [demal, demal / (DEMAL_GRAMS_PER_KILOGRAM[demal] / 1000)] as const,
);

/** Demal per mass fraction at `demal`, by Lagrange's parabola through the definitions of 0.01, 0.1 and 1 D. */
function demalPerMassFraction(demal: number): number {
  let sum = 0;
  for (const [x, y] of DEMAL_NODES) {
    let weight = y;
    for (const [other] of DEMAL_NODES) if (other !== x) weight *= (demal - other) / (x - other);
    sum += weight;
  }
  return sum;
}

export type ConcentrationBasis = 'molal' | 'demal' | 'molar';

/** 1.1 covers every standard and keeps the demal parabola between its nodes. */
const HIGHEST: Readonly<Record<ConcentrationBasis, number>> = { molal: 1.1, demal: 1.1, molar: 1.1 };
const UNIT: Readonly<Record<ConcentrationBasis, string>> = { molal: 'mol/kg', demal: 'D', molar: 'mol/L' };
/** Mass fraction changes a density so little that each turn takes two decimals off the error. */
const FIXED_POINT_STEPS = 12;

function toMassFraction(basis: ConcentrationBasis, value: number, temperatureC: number): number {
  if (basis === 'molal') return (value * KCL_MOLAR_MASS) / (1000 + value * KCL_MOLAR_MASS);
  if (basis === 'demal') return value / demalPerMassFraction(value);
  let w = (value * KCL_MOLAR_MASS) / waterDensity(temperatureC);
  for (let step = 0; step < FIXED_POINT_STEPS; step += 1) {
    w = (value * KCL_MOLAR_MASS) / kclSolutionDensity({ massFraction: w, temperatureC });
  }
  return w;
}

function fromMassFraction(basis: ConcentrationBasis, w: number, temperatureC: number): number {
  if (basis === 'molal') return (1000 * w) / (KCL_MOLAR_MASS * (1 - w));
  if (basis === 'molar') return (w * kclSolutionDensity({ massFraction: w, temperatureC })) / KCL_MOLAR_MASS;
  let demal = w * demalPerMassFraction(0);
  for (let step = 0; step < FIXED_POINT_STEPS; step += 1) demal = w * demalPerMassFraction(demal);
  return demal;
}

function requireBasis(basis: ConcentrationBasis): void {
  if (Object.hasOwn(UNIT, basis)) return;
  throw new InvalidInputError(`Unknown basis ${String(basis)}: use molal, demal or molar.`);
}

/**
 * The concentration of a KCl solution on another basis.
 *
 * c = w rho/M;  m = 1000 w/(M (1 - w));  D from the masses that define 0.01, 0.1 and 1 demal
 *
 * @param options.value concentration on the basis `from`, 0 to 1.1
 * @param options.from and options.to molal (mol/kg of water), demal, or molar (mol/L of solution at options.temperatureC)
 * @param options.temperatureC temperature of the LITRE, °C, 0 to 95; molal and demal do not depend on it
 * @returns concentration on the basis `to`
 * @throws OutOfDomainError outside these ranges, InvalidInputError for an unknown basis
 * Accuracy: 0.02 % (density); 0.001 % between molal and demal.
 * Source: laliberte-2009, oiml-r56.
 * @example convertConcentration({ value: 1, from: 'demal', to: 'molal', temperatureC: 25 }) // ≈ 1.027252
 * @example convertConcentration({ value: 0.01, from: 'molal', to: 'molar', temperatureC: 25 }) // ≈ 0.009968
 */
export function convertConcentration(options: {
  value: number;
  from: ConcentrationBasis;
  to: ConcentrationBasis;
  temperatureC: number;
}): number {
  const { value, from, to, temperatureC } = options;
  requireBasis(from);
  requireBasis(to);
  requireWithin(`concentration (${from})`, value, UNIT[from], 0, HIGHEST[from]);
  requireWithin('temperature of the litre', temperatureC, '°C', 0, 95);
  if (from === to) return value;
  return fromMassFraction(to, toMassFraction(from, value, temperatureC), temperatureC);
}

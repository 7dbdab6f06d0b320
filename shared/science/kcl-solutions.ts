/** Conductivity of KCl solutions between the standards: by equation at 25 °C, by a scaled limiting law at other temperatures. */
import { cubicSpline, evaluateSpline } from './cubic-spline.ts';
import { kclLimitingConductivityFromZero } from './electrolytes.ts';
import { requireNonNegative, requireWithin } from './errors.ts';
import { onsagerCoefficients } from './onsager.ts';
import { constant } from './references.ts';
import type { ReferenceKey } from './references.ts';
import { waterDensity } from './water.ts';

const EXTENDED = constant(
  { limiting: 149.873, root: -95.01, logarithm: 38.48, linear: 183.1, threeHalves: -176.4 },
  'S cm²/mol and powers of mol/L',
  'juhasz-marsh-1981',
).value;
const EXTENDED_LIMIT = constant(0.04, 'mol/L', 'juhasz-marsh-1981').value;

const LIND = constant(
  { limiting: 149.93, root: -94.65, logarithm: 58.74, linear: 198.4 },
  'S cm²/mol on the international ohm and powers of mol/L',
  'lind-zwolenik-fuoss-1959',
).value;
const LIND_LIMIT = constant(0.012, 'mol/L', 'lind-zwolenik-fuoss-1959').value;

/** c log10 c, with its limit 0 at c = 0 where the computer would say NaN. */
const concentrationTimesLog = (c: number): number => (c === 0 ? 0 : c * Math.log10(c));

/**
 * Molar conductivity of KCl at 25 °C, beyond the limiting law.
 *
 * Lambda = 149.873 - 95.01 c^1/2 + 38.48 c log10 c + 183.1 c - 176.4 c^3/2, on the absolute ohm
 *
 * @param options.concentrationMolL c, concentration at 25 °C, mol/L, 0 to 0.04
 * @returns molar conductivity, S·cm²/mol
 * @throws OutOfDomainError outside 0 to 0.04 mol/L
 * Accuracy: 0.06 % from the tables of Shedlovsky on the absolute ohm, which it exceeds by 0.02 to 0.06 % to 0.01 mol/L.
 * Source: juhasz-marsh-1981.
 * @example kclMolarConductivity({ concentrationMolL: 0.01 }) // ≈ 141.257
 */
export function kclMolarConductivity(options: { concentrationMolL: number }): number {
  const c = requireWithin('concentration of KCl', options.concentrationMolL, 'mol/L', 0, EXTENDED_LIMIT);
  const { limiting, root, logarithm, linear, threeHalves } = EXTENDED;
  return (
    limiting +
    root * Math.sqrt(c) +
    logarithm * concentrationTimesLog(c) +
    linear * c +
    threeHalves * c ** 1.5
  );
}

/**
 * Molar conductivity of KCl at 25 °C by the 1959 equation, AS PRINTED: on the international ohm.
 *
 * Lambda(int) = 149.93 - 94.65 c^1/2 + 58.74 c log10 c + 198.4 c; multiply by 0.999505 (absoluteFromInternationalOhm) before use
 *
 * @param options.concentrationMolL c, mol/L, 0 to 0.012
 * @returns molar conductivity per international ohm, S·cm²/mol
 * @throws OutOfDomainError outside 0 to 0.012 mol/L
 * Accuracy: 0.0045 % from the old-ohm tables of Shedlovsky.
 * Source: lind-zwolenik-fuoss-1959.
 * @example kclMolarConductivityInternationalOhm({ concentrationMolL: 0.01 }) // ≈ 141.274
 */
export function kclMolarConductivityInternationalOhm(options: { concentrationMolL: number }): number {
  const c = requireWithin('concentration of KCl', options.concentrationMolL, 'mol/L', 0, LIND_LIMIT);
  const { limiting, root, logarithm, linear } = LIND;
  return limiting + root * Math.sqrt(c) + logarithm * concentrationTimesLog(c) + linear * c;
}

/** kappa[µS/cm] = 1000 Lambda[S cm²/mol] c[mol/L]. */
const conductivityAt25 = (concentrationMolL: number): number =>
  1000 * concentrationMolL * kclMolarConductivity({ concentrationMolL });

const FIXED_POINT_STEPS = 10;

/**
 * Concentration of the KCl solution that has a given conductivity at 25 °C, the water's part taken off beforehand.
 *
 * 1000 c Lambda(c) = kappa, solved by c <- kappa/(1000 Lambda(c))
 *
 * @param conductivityUsCm conductivity at 25 °C, µS/cm, 0 to 5385 (0.04 mol/L)
 * @returns concentration at 25 °C, mol/L
 * @throws OutOfDomainError outside that range
 * Accuracy: that of kclMolarConductivity; the inversion itself 1e-9.
 * Source: juhasz-marsh-1981.
 * @example kclConcentrationAt25(84) // ≈ 5.690e-4
 */
export function kclConcentrationAt25(conductivityUsCm: number): number {
  const highest = conductivityAt25(EXTENDED_LIMIT);
  requireWithin('conductivity of the KCl solution at 25 °C', conductivityUsCm, 'µS/cm', 0, highest);
  let c = conductivityUsCm / (1000 * EXTENDED.limiting);
  // Lambda changes so little with c that each turn leaves a tenth of the error or less.
  for (let step = 0; step < FIXED_POINT_STEPS; step += 1) {
    c = Math.min(conductivityUsCm / (1000 * kclMolarConductivity({ concentrationMolL: c })), EXTENDED_LIMIT);
  }
  return c;
}

/**
 * The limiting law through KCl's temperatures, tabulated once: Lambda0(t) rho(t) and (A + B Lambda0)(t) rho(t)^3/2, both
 * relative to the density at 25 °C, so that kappa(t) of a fixed molality is proportional to P(t) - Q(t) sqrt(c25).
 */
const NODES_C = Array.from({ length: 23 }, (_, index) => index * 2.5);
const DENSITY_AT_25 = waterDensity(25);
const unhindered = cubicSpline(
  NODES_C,
  NODES_C.map((t) => (kclLimitingConductivityFromZero(t) * waterDensity(t)) / DENSITY_AT_25),
);
const hindrance = cubicSpline(
  NODES_C,
  NODES_C.map((t) => {
    const { a, b } = onsagerCoefficients({ temperatureC: t });
    return (a + b * kclLimitingConductivityFromZero(t)) * (waterDensity(t) / DENSITY_AT_25) ** 1.5;
  }),
);
const UNHINDERED_AT_25 = evaluateSpline(unhindered, 25).value;
const HINDRANCE_AT_25 = evaluateSpline(hindrance, 25).value;

/** The scaled law reproduces the 0.01 mol/kg column within 0.09 % from 0 to 50 °C: no further than that solution. */
const DILUTE_LIMIT = constant(0.01, 'mol/L', 'pratt-2001').value;
const DILUTE_LOWEST_C = constant(0, '°C', 'pratt-2001').value;
const DILUTE_HIGHEST_C = constant(50, '°C', 'pratt-2001').value;
/** Half of it is the 25 °C equation's distance to the tables, half the scaling; taken together as k = 1. */
const DILUTE_RELATIVE_STANDARD_UNCERTAINTY = constant(1e-3, 'relative', 'pratt-2001').value;

/**
 * Conductivity of a dilute KCl solution at t relative to 25 °C.
 *
 * kappa(t)/kappa(25) = Lambda(c(t), t) rho(t)/[the same at 25 °C], Lambda by the limiting law, c(t) = c25 rho(t)/rho(25)
 *
 * @param options.concentrationMolL c25, concentration at 25 °C, mol/L, 0 to 0.01
 * @param options.temperatureC temperature, °C, 0 to 50
 * @returns ratio (pure number) and its change per K
 * @throws OutOfDomainError outside these ranges
 * Accuracy: 0.05 % from 15 to 35 °C, 0.1 % from 0 to 50 °C, at 0.01 mol/L; better when more dilute.
 * Source: onsager-1927 with harned-owen, checked against pratt-2001.
 * @example diluteKclTemperatureRatio({ concentrationMolL: 5.69e-4, temperatureC: 20 }).ratio // ≈ 0.90354
 */
export function diluteKclTemperatureRatio(options: { concentrationMolL: number; temperatureC: number }): {
  ratio: number;
  ratioPerK: number;
} {
  const c = requireWithin('concentration of KCl', options.concentrationMolL, 'mol/L', 0, DILUTE_LIMIT);
  requireWithin('temperature', options.temperatureC, '°C', DILUTE_LOWEST_C, DILUTE_HIGHEST_C);
  const root = Math.sqrt(c);
  const p = evaluateSpline(unhindered, options.temperatureC);
  const q = evaluateSpline(hindrance, options.temperatureC);
  const at25 = UNHINDERED_AT_25 - HINDRANCE_AT_25 * root;
  return { ratio: (p.value - q.value * root) / at25, ratioPerK: (p.slope - q.slope * root) / at25 };
}

/**
 * Conductivity of a dilute KCl solution with the water it was made of.
 *
 * kappa(t) = 1000 c25 Lambda(c25) diluteKclTemperatureRatio(c25, t) + kappa(water, t)
 *
 * @param options.concentrationMolL c25, concentration at 25 °C, mol/L, 0 to 0.01
 * @param options.temperatureC temperature, °C, 0 to 50
 * @param options.solventUsCm measured conductivity of the water at that temperature, µS/cm, 0 or more
 * @returns conductivity in µS/cm, its standard uncertainty in µS/cm (the model's; the concentration's is not in it), model in words
 *   and the reference of the 25 °C equation
 * @throws OutOfDomainError outside these ranges
 * Accuracy: 0.1 % of the salt's part (k = 1).
 * Source: juhasz-marsh-1981 at 25 °C, onsager-1927 for the temperature.
 * @example diluteKclConductivity({ concentrationMolL: 5.6902e-4, temperatureC: 20, solventUsCm: 0 }).conductivityUsCm // ≈ 75.90
 */
export function diluteKclConductivity(options: {
  concentrationMolL: number;
  temperatureC: number;
  solventUsCm: number;
}): { conductivityUsCm: number; standardUncertaintyUsCm: number; model: string; source: ReferenceKey } {
  const solvent = requireNonNegative('conductivity of the water', options.solventUsCm, 'µS/cm');
  const { ratio } = diluteKclTemperatureRatio(options);
  const salt = conductivityAt25(options.concentrationMolL) * ratio;
  return {
    conductivityUsCm: salt + solvent,
    standardUncertaintyUsCm: salt * DILUTE_RELATIVE_STANDARD_UNCERTAINTY,
    model: 'KCl equation at 25 °C, scaled to the temperature by the limiting law, water added',
    source: 'juhasz-marsh-1981',
  };
}

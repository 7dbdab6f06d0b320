/** Check solutions made in house by diluting a lot of KCl solution with water, both weighed in air. */
import { KCL_MOLAR_MASS, convertConcentration, kclSolutionDensity } from './concentration.ts';
import { OutOfDomainError, requireNonNegative, requirePositive, requireWithin } from './errors.ts';
import { diluteKclTemperatureRatio } from './kcl-solutions.ts';
import { kclConductivityByMolality, massFromReading } from './kcl-preparation.ts';
import { constant } from './references.ts';
import { COVERAGE_PROBABILITY_K2, combineUncertainty } from './uncertainty.ts';
import type { BudgetRow, UncertaintyComponent } from './uncertainty.ts';
import { waterDensity } from './water.ts';

const LOWEST_MOLALITY = constant(1e-4, 'mol/kg', 'juhasz-marsh-1981').value;
const HIGHEST_MOLALITY = constant(1.032, 'mol/kg', 'chambers-1956').value;
const BISECTIONS = 60;

/**
 * Molality of the KCl solution that has a given conductivity at 25 °C, the water's part taken off beforehand.
 *
 * kclConductivityByMolality(m) = kappa, solved by halving ln m
 *
 * @param conductivityUsCm conductivity of the salt at 25 °C, µS/cm, about 14.9 to 111 500 (1e-4 to 1.032 mol/kg)
 * @returns molality, mol/kg of water
 * @throws OutOfDomainError outside that range
 * Accuracy: that of kclConductivityByMolality; the inversion itself 1e-12.
 * Source: pratt-2001, juhasz-marsh-1981, chambers-1956.
 * @example kclMolalityByConductivity(1408.23) // ≈ 0.01000
 */
export function kclMolalityByConductivity(conductivityUsCm: number): number {
  const kappa = (m: number): number => kclConductivityByMolality(m).conductivityUsCm;
  requireWithin(
    'conductivity of the KCl solution at 25 °C',
    conductivityUsCm,
    'µS/cm',
    kappa(LOWEST_MOLALITY),
    kappa(HIGHEST_MOLALITY),
  );
  let low = Math.log(LOWEST_MOLALITY);
  let high = Math.log(HIGHEST_MOLALITY);
  for (let step = 0; step < BISECTIONS; step += 1) {
    const middle = (low + high) / 2;
    if (kappa(Math.exp(middle)) < conductivityUsCm) low = middle;
    else high = middle;
  }
  return Math.exp((low + high) / 2);
}

/** The scaled limiting law holds to here, and with it the temperature table. */
const HIGHEST_DILUTED_MOLARITY = constant(0.01, 'mol/L', 'pratt-2001').value;
/** Temperatures of the table: where a bench comparison is made. */
const TABLE_TEMPERATURES_C = constant(
  [10, 15, 18, 20, 22, 24, 25, 26, 28, 30, 35] as const,
  '°C',
  'bench-practice',
).value;
/** What the scaled law may add over those temperatures, k = 1. */
const TEMPERATURE_MODEL = constant(1e-3, 'relative', 'pratt-2001').value;
/** Traces of salts and carbon dioxide in water: about 2 %/K near 25 °C, half a per cent either way. */
const BLANK_PER_K = constant(0.02, 'relative per K', 'bench-practice').value;
/** Water in equilibrium with air against water without carbon dioxide, at 25 °C. */
const CARBON_DIOXIDE_US_CM = constant(1.1, 'µS/cm', 'pratt-2001').value;
const BENCH = constant({ readingG: 1e-2, blankShare: 0.1 }, 'g, part of the blank', 'bench-practice').value;
const ROOM_TEMPERATURE_C = constant(20, '°C', 'bench-practice').value;

export type KclDilution = {
  /** Conductivity at 25 °C of the solution that is diluted, and its standard uncertainty. */
  stockConductivityUsCm: number;
  stockStandardUncertaintyUsCm: number;
  /** Part of that conductivity which is the stock's own water. Not given = not known: up to what air puts into water. */
  stockBlankUsCm?: number;
  /** Balance readings in air. */
  stockReadingG: number;
  waterReadingG: number;
  airDensityKgM3: number;
  /** Measured conductivity of the water at 25 °C. */
  waterBlankUsCm: number;
  /** False when blank and solution may differ in dissolved carbon dioxide: half of what air puts into water is then in doubt. */
  isBlankInSameState: boolean;
  stockReadingStandardUncertaintyG?: number;
  waterReadingStandardUncertaintyG?: number;
  waterBlankStandardUncertaintyUsCm?: number;
};

export type DilutedKcl = {
  stockMolalityMolKg: number;
  molalityMolKg: number;
  /** At 25 °C. */
  molarityMolL: number;
  /** Mass of the mixture over the mass of the stock in it. */
  dilutionFactor: number;
  /** At 25 °C, the water's conductivity included. */
  conductivityUsCm: number;
  saltConductivityUsCm: number;
  /** U of conductivityUsCm, µS/cm; the temperature table has the same relative U. */
  expandedUncertainty: number;
  standardUncertaintyUsCm: number;
  coverageFactor: number;
  temperatureTable: { temperatureC: number; conductivityUsCm: number }[];
  budget: BudgetRow[];
};

/** Grams of KCl per gram of solution. */
const massFractionOf = (molalityMolKg: number): number =>
  (molalityMolKg * KCL_MOLAR_MASS) / (1000 + molalityMolKg * KCL_MOLAR_MASS);

function mix(given: KclDilution, stockMolality: number): { molality: number; factor: number } {
  const massFraction = massFractionOf(stockMolality);
  const { airDensityKgM3 } = given;
  const stockG = massFromReading({
    airDensityKgM3,
    readingG: requirePositive('reading of the stock solution', given.stockReadingG, 'g'),
    bodyDensityKgM3: kclSolutionDensity({ massFraction, temperatureC: ROOM_TEMPERATURE_C }),
  });
  const waterG = massFromReading({
    airDensityKgM3,
    readingG: requirePositive('reading of the water', given.waterReadingG, 'g'),
    bodyDensityKgM3: waterDensity(ROOM_TEMPERATURE_C),
  });
  const kclG = stockG * massFraction;
  return {
    molality: (1000 * kclG) / (KCL_MOLAR_MASS * (stockG - kclG + waterG)),
    factor: (stockG + waterG) / stockG,
  };
}

function requireDilute(molarityMolL: number): number {
  if (molarityMolL <= HIGHEST_DILUTED_MOLARITY) return molarityMolL;
  throw new OutOfDomainError({
    quantity: 'concentration of the diluted solution',
    // Four decimals say enough in a sentence.
    value: Math.round(molarityMolL * 1e4) / 1e4,
    unit: 'mol/L',
    lower: LOWEST_MOLALITY,
    upper: HIGHEST_DILUTED_MOLARITY,
    advice: 'Take more water or less of the lot; a stronger solution is prepared by weighing the salt.',
  });
}

/** In µS/cm. Conductivity is so nearly proportional to molality that relative parts of the dilution carry over. */
function componentsOf(
  given: KclDilution,
  salt: { conductivityUsCm: number; relativeStandardUncertainty: number },
  factor: number,
): UncertaintyComponent[] {
  const kappa = salt.conductivityUsCm;
  const { stockReadingG, waterReadingG, waterBlankUsCm } = given;
  // More of the stock also makes the mixture larger, and more water is only a part of it.
  const waterShare = (factor - 1) / factor;
  const normal = (name: string, value: number, sensitivity: number): UncertaintyComponent => ({
    name,
    value,
    sensitivity,
    distribution: 'normal',
  });
  const blankU = given.waterBlankStandardUncertaintyUsCm ?? BENCH.blankShare * waterBlankUsCm;
  const lines = [
    normal(
      'value of the lot diluted',
      given.stockStandardUncertaintyUsCm,
      kappa / given.stockConductivityUsCm,
    ),
    normal(
      'weighing of the lot',
      given.stockReadingStandardUncertaintyG ?? BENCH.readingG,
      (kappa / stockReadingG) * waterShare,
    ),
    normal(
      'weighing of the water',
      given.waterReadingStandardUncertaintyG ?? BENCH.readingG,
      (kappa / waterReadingG) * waterShare,
    ),
    normal('equation for KCl at 25 °C', salt.relativeStandardUncertainty, kappa),
    normal('temperature shape', TEMPERATURE_MODEL, kappa),
    normal('conductivity of the water', blankU, 1),
  ];
  if (given.stockBlankUsCm === undefined)
    lines.push({
      name: 'water in the lot, not known',
      value: CARBON_DIOXIDE_US_CM,
      sensitivity: kappa / given.stockConductivityUsCm,
      distribution: 'rectangular',
    });
  if (given.isBlankInSameState) return lines;
  return [
    ...lines,
    {
      name: 'carbon dioxide, blank and solution not in the same state',
      value: CARBON_DIOXIDE_US_CM,
      distribution: 'rectangular',
    },
  ];
}

/**
 * A check solution from a weighed part of a KCl lot and weighed water, with its temperature table.
 *
 * m0 from kappa_lot at 25 °C;  m = 1000 w0 ms/(M ((1 - w0) ms + mw)), w0 = m0 M/(1000 + m0 M), true masses ms of lot, mw of water
 * kappa(t) = kappa(m, 25) diluteKclTemperatureRatio(c, t) + blank (1 + 0.02 (t - 25))
 *
 * @param given stockConductivityUsCm (µS/cm at 25 °C) and its standard uncertainty, readings in g above 0, airDensityKgM3 0 to 2,
 *   waterBlankUsCm measured at 25 °C (0 to 5), isBlankInSameState, and the standard uncertainties of the readings and the blank, if known
 * @returns molality in mol/kg, molarity at 25 °C in mol/L, conductivity at 25 °C in µS/cm with U in µS/cm, k, budget and a table from 10 to 35 °C
 * @throws OutOfDomainError outside these ranges, below 1e-4 mol/kg and above 0.01 mol/L after dilution
 * Accuracy: 0.1 % from the equation and 0.1 % from the temperature shape (k = 1), beside what the lot and the weighing bring.
 * Source: pratt-2001, juhasz-marsh-1981, onsager-1927, weighing-practice.
 * @example diluteLot({ stockConductivityUsCm: 1408.23, stockStandardUncertaintyUsCm: 1.4, stockReadingG: 100, waterReadingG: 900, airDensityKgM3: 1.2, waterBlankUsCm: 0.9, isBlankInSameState: true }).dilutionFactor // ≈ 10.000
 */
export function diluteLot(given: KclDilution): DilutedKcl {
  const blank = requireWithin('conductivity of the water', given.waterBlankUsCm, 'µS/cm', 0, 5);
  const stockBlank = requireNonNegative('water in the stock solution', given.stockBlankUsCm ?? 0, 'µS/cm');
  requirePositive('conductivity of the stock solution', given.stockConductivityUsCm, 'µS/cm');
  const stockMolalityMolKg = kclMolalityByConductivity(given.stockConductivityUsCm - stockBlank);
  const { molality, factor } = mix(given, stockMolalityMolKg);
  const salt = kclConductivityByMolality(molality);
  const molarityMolL = requireDilute(
    convertConcentration({ value: molality, from: 'molal', to: 'molar', temperatureC: 25 }),
  );
  const { standard, expanded, coverageFactor, budget } = combineUncertainty({
    coverageProbability: COVERAGE_PROBABILITY_K2,
    components: componentsOf(given, salt, factor),
  });
  const at = (temperatureC: number): number =>
    salt.conductivityUsCm *
      diluteKclTemperatureRatio({ concentrationMolL: molarityMolL, temperatureC }).ratio +
    blank * (1 + BLANK_PER_K * (temperatureC - 25));
  return {
    stockMolalityMolKg,
    molalityMolKg: molality,
    molarityMolL,
    dilutionFactor: factor,
    conductivityUsCm: salt.conductivityUsCm + blank,
    saltConductivityUsCm: salt.conductivityUsCm,
    expandedUncertainty: expanded,
    standardUncertaintyUsCm: standard,
    coverageFactor,
    temperatureTable: TABLE_TEMPERATURES_C.map((temperatureC) => ({
      temperatureC,
      conductivityUsCm: at(temperatureC),
    })),
    budget,
  };
}

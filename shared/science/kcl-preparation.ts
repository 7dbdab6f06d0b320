/** KCl reference solutions made in house by weighing salt and water in air. */
import { KCL_MOLAR_MASS, convertConcentration } from './concentration.ts';
import { cubicSpline, evaluateSpline } from './cubic-spline.ts';
import { requireNonNegative, requirePositive, requireWithin } from './errors.ts';
import { kclMolarConductivity } from './kcl-solutions.ts';
import { MOLAL_RELATIVE_STANDARD_UNCERTAINTY, MOLAL_TABLE } from './kcl-tables.ts';
import { constant } from './references.ts';
import { COVERAGE_PROBABILITY_K2, combineUncertainty } from './uncertainty.ts';
import type { BudgetRow } from './uncertainty.ts';
import { waterDensity } from './water.ts';

const SOLID_DENSITY = constant(1984, 'kg/m³', 'kcl-solid-density').value;
const WEIGHT_DENSITY = constant(8000, 'kg/m³', 'weighing-practice').value;
const ROOM_TEMPERATURE_C = constant(20, '°C', 'bench-practice').value;

/**
 * The mass of a body from a balance reading in air.
 *
 * m = reading (1 - rho_air/rho_weights)/(1 - rho_air/rho_body)
 *
 * @param options.readingG balance reading, g, 0 or more
 * @param options.airDensityKgM3 density of the air, kg/m³, 0 to 2 (0 weighs in vacuo)
 * @param options.bodyDensityKgM3 density of what is weighed, kg/m³, above 500
 * @param options.weightDensityKgM3 density of the weights the balance was adjusted with, kg/m³, 8000 unless given
 * @returns mass, g
 * @throws OutOfDomainError outside these ranges
 * Accuracy: exact; 0.02 kg/m³ of air density is 1e-5 of the mass of salt or water, half that of their ratio.
 * Source: weighing-practice.
 * @example massFromReading({ readingG: 1, airDensityKgM3: 1.2, bodyDensityKgM3: 1984 }) // ≈ 1.000455
 */
export function massFromReading(options: {
  readingG: number;
  airDensityKgM3: number;
  bodyDensityKgM3: number;
  weightDensityKgM3?: number;
}): number {
  const reading = requireNonNegative('balance reading', options.readingG, 'g');
  const air = requireWithin('density of the air', options.airDensityKgM3, 'kg/m³', 0, 2);
  const body = requireWithin('density of the body', options.bodyDensityKgM3, 'kg/m³', 500, 25_000);
  const weights = requireWithin(
    'density of the weights',
    options.weightDensityKgM3 ?? WEIGHT_DENSITY,
    'kg/m³',
    500,
    25_000,
  );
  return (reading * (1 - air / weights)) / (1 - air / body);
}

/** S cm²/mol at 25 °C where the equation ends and the tables go on, against the square root of mol/L. */
const EQUATION_TO = constant(0.04, 'mol/L', 'juhasz-marsh-1981').value;
const NODES = [
  ...[0.02, 0.03, EQUATION_TO].map((c) => [c, kclMolarConductivity({ concentrationMolL: c })] as const),
  ...constant(
    [
      [0.05, 133.3],
      [0.1, 128.9],
    ] as const,
    'mol/L, S cm²/mol',
    'crc-equivalent-conductivity',
  ).value,
  ...constant(
    [
      [0.2, 124.0],
      [0.5, 117.3],
      [1, 111.9],
    ] as const,
    'mol/L, S cm²/mol',
    'chambers-1956',
  ).value,
];
const CONCENTRATED = cubicSpline(
  NODES.map(([c]) => Math.sqrt(c)),
  NODES.map(([, molar]) => molar),
);

function conductivityByMolarity(molarityMolL: number): number {
  const molar =
    molarityMolL <= EQUATION_TO
      ? kclMolarConductivity({ concentrationMolL: molarityMolL })
      : evaluateSpline(CONCENTRATED, Math.sqrt(molarityMolL)).value;
  return 1000 * molarityMolL * molar;
}

const molarityAt25 = (molalityMolKg: number): number =>
  convertConcentration({ value: molalityMolKg, from: 'molal', to: 'molar', temperatureC: 25 });

/** What the primary table says of 0.01, 0.1 and 1 mol/kg, over what equation and tables say there. */
const ANCHORS = ([0.01, 0.1, 1] as const).map((nominal) => {
  const row = MOLAL_TABLE[nominal].find(([t]) => t === 25) as readonly [number, number];
  return { nominal, ratio: row[1] / conductivityByMolarity(molarityAt25(nominal)) };
});
const ANCHOR_CURVE = cubicSpline(
  ANCHORS.map(({ nominal }) => Math.log10(nominal)),
  ANCHORS.map(({ ratio }) => ratio),
);

const LOWEST_MOLALITY = constant(1e-4, 'mol/kg', 'juhasz-marsh-1981').value;
const HIGHEST_MOLALITY = constant(1.032, 'mol/kg', 'chambers-1956').value;
/** Between the anchors equation and tables are trusted to their own 0.1 %; this near to one, to the anchor. */
const BETWEEN_ANCHORS = constant(1e-3, 'relative', 'crc-equivalent-conductivity').value;
const NEAR_AN_ANCHOR = constant(0.05, 'relative', 'bench-practice').value;

/**
 * Conductivity at 25 °C of a KCl solution of any strength, tied to the primary table at 0.01, 0.1 and 1 mol/kg.
 *
 * kappa = 1000 c Lambda(c) g(m);  c the molarity at 25 °C, Lambda by equation to 0.04 mol/L and by table above, g(m) what makes it
 * exact at the three standards
 *
 * @param molalityMolKg m, mol/kg of water, 1e-4 to 1.032
 * @returns conductivity without the water's, µS/cm, and its relative standard uncertainty
 * @throws OutOfDomainError outside that range
 * Accuracy: 0.03 to 0.04 % within 5 % of a standard, 0.1 % elsewhere (k = 1).
 * Source: pratt-2001, juhasz-marsh-1981, crc-equivalent-conductivity, chambers-1956.
 * @example kclConductivityByMolality(0.01).conductivityUsCm // ≈ 1408.23
 */
export function kclConductivityByMolality(molalityMolKg: number): {
  conductivityUsCm: number;
  relativeStandardUncertainty: number;
} {
  const m = requireWithin('molality of KCl', molalityMolKg, 'mol/kg', LOWEST_MOLALITY, HIGHEST_MOLALITY);
  // Beyond the outer standards the tie is held, not extrapolated.
  const tie = evaluateSpline(ANCHOR_CURVE, Math.log10(Math.min(Math.max(m, 0.01), 1))).value;
  const anchor = ANCHORS.find(({ nominal }) => Math.abs(m / nominal - 1) <= NEAR_AN_ANCHOR);
  return {
    conductivityUsCm: conductivityByMolarity(molarityAt25(m)) * tie,
    relativeStandardUncertainty:
      anchor === undefined ? BETWEEN_ANCHORS : MOLAL_RELATIVE_STANDARD_UNCERTAINTY[anchor.nominal],
  };
}

export type KclWeighing = {
  /** Balance reading of the salt in air. */
  kclReadingG: number;
  /** Balance reading of the water in air. */
  waterReadingG: number;
  airDensityKgM3: number;
  /** Mass of KCl per mass of dry salt; 1 unless given. */
  purity?: number;
  /** Part of the salt's mass that drying would have taken off: moisture, counted as water; 0 when it was dried. */
  dryingLossFraction?: number;
  weightDensityKgM3?: number;
  saltDensityKgM3?: number;
  waterTemperatureC?: number;
  /** Measured conductivity of the water at 25 °C, added to the solution's; 0 unless given. */
  waterBlankUsCm?: number;
  /** Half-widths and standard uncertainties; each has the value of careful bench work unless given. */
  kclReadingStandardUncertaintyG?: number;
  waterReadingStandardUncertaintyG?: number;
  airDensityHalfWidthKgM3?: number;
  purityHalfWidth?: number;
  dryingLossHalfWidth?: number;
  waterBlankStandardUncertaintyUsCm?: number;
};

const BENCH = constant(
  {
    kclReadingG: 2e-4,
    waterReadingG: 2e-2,
    airDensityKgM3: 0.05,
    purity: 5e-4,
    dryingLoss: 1e-4,
    blankShare: 0.1,
  },
  'g, g, kg/m³, mass fractions, part of the blank',
  'bench-practice',
).value;

type Masses = { saltG: number; kclG: number; waterG: number };

function trueMasses(weighing: KclWeighing): Masses {
  const {
    airDensityKgM3,
    waterTemperatureC = ROOM_TEMPERATURE_C,
    saltDensityKgM3 = SOLID_DENSITY,
  } = weighing;
  const air = {
    airDensityKgM3,
    ...(weighing.weightDensityKgM3 === undefined ? {} : { weightDensityKgM3: weighing.weightDensityKgM3 }),
  };
  const purity = requireWithin('purity of the salt', weighing.purity ?? 1, '', 0.9, 1);
  const loss = requireWithin('drying loss of the salt', weighing.dryingLossFraction ?? 0, '', 0, 0.1);
  const saltG = massFromReading({
    ...air,
    readingG: requirePositive('reading of the salt', weighing.kclReadingG, 'g'),
    bodyDensityKgM3: saltDensityKgM3,
  });
  const addedG = massFromReading({
    ...air,
    readingG: requirePositive('reading of the water', weighing.waterReadingG, 'g'),
    bodyDensityKgM3: waterDensity(waterTemperatureC),
  });
  return { saltG, kclG: saltG * (1 - loss) * purity, waterG: addedG + saltG * loss };
}

/** Every line of the budget in µS/cm: conductivity is so nearly proportional to molality that relative parts carry over. */
function weighingBudget(
  weighing: KclWeighing,
  salt: { conductivityUsCm: number; relativeStandardUncertainty: number },
) {
  const { kclReadingG, waterReadingG, purity = 1, waterBlankUsCm = 0 } = weighing;
  const kappa = salt.conductivityUsCm;
  const perKgM3 =
    kappa * Math.abs(1 / (weighing.saltDensityKgM3 ?? SOLID_DENSITY) - 1 / waterDensity(ROOM_TEMPERATURE_C));
  const normal = (name: string, value: number, sensitivity: number) => ({
    name,
    value,
    sensitivity,
    distribution: 'normal' as const,
  });
  const flat = (name: string, value: number, sensitivity: number) => ({
    name,
    value,
    sensitivity,
    distribution: 'rectangular' as const,
  });
  return combineUncertainty({
    coverageProbability: COVERAGE_PROBABILITY_K2,
    components: [
      normal('reference conductivity of KCl', salt.relativeStandardUncertainty, kappa),
      normal(
        'weighing of the salt',
        weighing.kclReadingStandardUncertaintyG ?? BENCH.kclReadingG,
        kappa / kclReadingG,
      ),
      normal(
        'weighing of the water',
        weighing.waterReadingStandardUncertaintyG ?? BENCH.waterReadingG,
        kappa / waterReadingG,
      ),
      flat('air buoyancy', weighing.airDensityHalfWidthKgM3 ?? BENCH.airDensityKgM3, perKgM3),
      flat('purity of the salt', weighing.purityHalfWidth ?? BENCH.purity, kappa / purity),
      flat('moisture of the salt', weighing.dryingLossHalfWidth ?? BENCH.dryingLoss, kappa),
      normal(
        'conductivity of the water',
        weighing.waterBlankStandardUncertaintyUsCm ?? BENCH.blankShare * waterBlankUsCm,
        1,
      ),
    ],
  });
}

export type PreparedKcl = {
  molalityMolKg: number;
  /** At 25 °C. */
  molarityMolL: number;
  demal: number;
  /** At 25 °C, the water's conductivity included. */
  conductivityUsCm: number;
  /** At 25 °C, of the salt alone. */
  saltConductivityUsCm: number;
  kclMassG: number;
  waterMassG: number;
  /** U of conductivityUsCm, µS/cm. */
  expandedUncertainty: number;
  standardUncertaintyUsCm: number;
  coverageFactor: number;
  budget: BudgetRow[];
};

/**
 * A KCl solution from two balance readings in air.
 *
 * m_true = reading (1 - ra/rw)/(1 - ra/rx);  m = 1000 purity (1 - loss) m_salt/(M (m_water + loss m_salt))
 * kappa(25) = kclConductivityByMolality(m) + blank;  U from weighing, buoyancy, purity, moisture, blank and the KCl table
 *
 * @param weighing kclReadingG and waterReadingG (g, above 0), airDensityKgM3 (0 to 2); purity 0.9 to 1, dryingLossFraction 0 to 0.1,
 *   densities in kg/m³, waterTemperatureC 0 to 100 °C (20 unless given), waterBlankUsCm at 25 °C, and the uncertainties, if known
 * @returns molality in mol/kg, molarity at 25 °C in mol/L, demal, conductivity at 25 °C in µS/cm with U in µS/cm, k and budget
 * @throws OutOfDomainError outside these ranges or 1e-4 to 1.032 mol/kg
 * Accuracy: weighing in air uncorrected would be 0.06 % low in molality, twice the uncertainty of the standard.
 * Source: weighing-practice, iupac-atomic-weights, pratt-2001.
 * @example prepareKcl({ kclReadingG: 0.745513, waterReadingG: 1000, airDensityKgM3: 0 }).molalityMolKg // ≈ 0.0100000
 */
export function prepareKcl(weighing: KclWeighing): PreparedKcl {
  const waterBlankUsCm = requireNonNegative(
    'conductivity of the water',
    weighing.waterBlankUsCm ?? 0,
    'µS/cm',
  );
  const { kclG, waterG } = trueMasses(weighing);
  const molalityMolKg = (1000 * kclG) / (KCL_MOLAR_MASS * waterG);
  const salt = kclConductivityByMolality(molalityMolKg);
  const { standard, expanded, coverageFactor, budget } = weighingBudget(weighing, salt);
  return {
    molalityMolKg,
    molarityMolL: molarityAt25(molalityMolKg),
    demal: convertConcentration({ value: molalityMolKg, from: 'molal', to: 'demal', temperatureC: 25 }),
    conductivityUsCm: salt.conductivityUsCm + waterBlankUsCm,
    saltConductivityUsCm: salt.conductivityUsCm,
    kclMassG: kclG,
    waterMassG: waterG,
    expandedUncertainty: expanded,
    standardUncertaintyUsCm: standard,
    coverageFactor,
    budget,
  };
}

/** Ions and salts: how fast ions move when nothing holds them back. */
import { InvalidInputError, OutOfDomainError, requireWithin } from './errors.ts';
import { constant } from './references.ts';

/** Limiting ionic conductivity at 25 °C, S cm² per EQUIVALENT, absolute ohm. */
const AT_25 = constant(
  {
    H: 349.65,
    Li: 38.66,
    Na: 50.08,
    K: 73.48,
    Mg: 53.0,
    Ca: 59.47,
    Ba: 63.6,
    OH: 198,
    Cl: 76.31,
    Br: 78.1,
    NO3: 71.42,
    HCO3: 44.5,
    SO4: 80.0,
  },
  'S cm²/equivalent',
  'crc-ionic-conductivity',
).value;

/** The same, of ions that only the older list holds (international ohm there, brought to the absolute ohm: x 0.999505). */
const AT_25_INTERNATIONAL = constant(
  { NH4: 73.4, Sr: 59.46, F: 55.32 },
  'S cm²/equivalent',
  'usgs-wsp-2311',
).value;
const INTERNATIONAL_OHM = constant(0.999505, 'absolute per international', 'international-ohm-1948').value;

/** Half the table value of CuSO4 less SO4: only used to show that the law refuses 2:2 salts. */
const COPPER_AT_25 = constant(133.6 - 80.0, 'S cm²/equivalent', 'crc-equivalent-conductivity').value;

/** lambda(t) = l25 + a d + b d² + c d³, d = t - 25, S cm² per mole (all are univalent). */
const CUBIC = constant(
  {
    K: [73.5, 1.43262, 0.40563e-2, -0.3183e-4],
    Cl: [76.35, 1.54037, 0.465e-2, -0.128e-4],
    Na: [50.15, 1.0916, 0.4715e-2, -0.115e-4],
    Li: [38.64, 0.88986, 0.44075e-2, -0.204e-4],
    H: [349.85, 4.81595, -1.03125e-2, -0.767e-4],
    Br: [78.17, 1.5437, 0.447e-2, -0.23e-4],
    I: [76.9, 1.5093, 0.4375e-2, -0.217e-4],
  },
  'S cm²/mol and powers of K',
  'harned-owen',
).value;

export type Ion = keyof typeof AT_25 | keyof typeof AT_25_INTERNATIONAL | keyof typeof CUBIC | 'Cu';

/** The charge of each ion in units of e. */
const CHARGE: Readonly<Record<Ion, number>> = {
  H: 1,
  Li: 1,
  Na: 1,
  K: 1,
  NH4: 1,
  Mg: 2,
  Ca: 2,
  Sr: 2,
  Ba: 2,
  Cu: 2,
  OH: -1,
  F: -1,
  Cl: -1,
  Br: -1,
  I: -1,
  NO3: -1,
  HCO3: -1,
  SO4: -2,
};

const IONS_OF = {
  KCl: ['K', 'Cl'],
  NaCl: ['Na', 'Cl'],
  LiCl: ['Li', 'Cl'],
  HCl: ['H', 'Cl'],
  KBr: ['K', 'Br'],
  NaBr: ['Na', 'Br'],
  LiBr: ['Li', 'Br'],
  HBr: ['H', 'Br'],
  KI: ['K', 'I'],
  NaI: ['Na', 'I'],
  LiI: ['Li', 'I'],
  HI: ['H', 'I'],
  NH4Cl: ['NH4', 'Cl'],
  KF: ['K', 'F'],
  NaF: ['Na', 'F'],
  KNO3: ['K', 'NO3'],
  NaNO3: ['Na', 'NO3'],
  KHCO3: ['K', 'HCO3'],
  NaHCO3: ['Na', 'HCO3'],
  NaOH: ['Na', 'OH'],
  KOH: ['K', 'OH'],
  CaCl2: ['Ca', 'Cl'],
  MgCl2: ['Mg', 'Cl'],
  SrCl2: ['Sr', 'Cl'],
  BaCl2: ['Ba', 'Cl'],
  Na2SO4: ['Na', 'SO4'],
  K2SO4: ['K', 'SO4'],
  MgSO4: ['Mg', 'SO4'],
  CaSO4: ['Ca', 'SO4'],
  CuSO4: ['Cu', 'SO4'],
} as const satisfies Record<string, readonly [Ion, Ion]>;

export type Salt = keyof typeof IONS_OF;
export const salts = Object.keys(IONS_OF) as Salt[];

export type SaltComposition = {
  readonly cation: Ion;
  readonly anion: Ion;
  readonly cationCharge: number;
  /** Size of the anion's charge, positive. */
  readonly anionCharge: number;
  readonly cationsPerMole: number;
  readonly anionsPerMole: number;
  /** Positive charges per mole of salt: Lambda(molar) = equivalentsPerMole x Lambda(equivalent). */
  readonly equivalentsPerMole: number;
};

const greatestCommonDivisor = (a: number, b: number): number =>
  b === 0 ? a : greatestCommonDivisor(b, a % b);

/**
 * What a mole of salt falls into, by electroneutrality.
 *
 * nu(cation) z(cation) = nu(anion) |z(anion)|, smallest whole numbers
 *
 * @param salt formula, one of `salts`
 * @returns ions, charges, ions per mole and equivalents per mole (pure numbers)
 * @throws InvalidInputError for a salt that is not listed
 * Accuracy: exact.
 * Source: electroneutrality.
 * @example saltComposition('CaCl2').equivalentsPerMole // 2
 */
export function saltComposition(salt: Salt): SaltComposition {
  const ions: readonly [Ion, Ion] | undefined = Object.hasOwn(IONS_OF, salt) ? IONS_OF[salt] : undefined;
  if (ions === undefined)
    throw new InvalidInputError(`Unknown salt ${String(salt)}: use one of ${salts.join(', ')}.`);
  const [cation, anion] = ions;
  const cationCharge = CHARGE[cation];
  const anionCharge = -CHARGE[anion];
  const shared = greatestCommonDivisor(cationCharge, anionCharge);
  const cationsPerMole = anionCharge / shared;
  const anionsPerMole = cationCharge / shared;
  const equivalentsPerMole = cationsPerMole * cationCharge;
  return { cation, anion, cationCharge, anionCharge, cationsPerMole, anionsPerMole, equivalentsPerMole };
}

function cubicOf(ion: Ion): readonly [number, number, number, number] | undefined {
  return ion in CUBIC ? CUBIC[ion as keyof typeof CUBIC] : undefined;
}

function at25(ion: Ion): number {
  if (ion in AT_25) return AT_25[ion as keyof typeof AT_25];
  if (ion in AT_25_INTERNATIONAL) {
    return AT_25_INTERNATIONAL[ion as keyof typeof AT_25_INTERNATIONAL] * INTERNATIONAL_OHM;
  }
  if (ion === 'Cu') return COPPER_AT_25;
  return CUBIC[ion as keyof typeof CUBIC][0];
}

/** The limits of the measured temperatures behind the cubics. */
const LOWEST_C = constant(5, '°C', 'harned-owen').value;
const HIGHEST_C = constant(55, '°C', 'harned-owen').value;

/**
 * Limiting conductivity of one ion, per equivalent of charge.
 *
 * lambda(t) = l25 + a d + b d² + c d³, d = t - 25 (K, Cl, Na, Li, H, Br, I); other ions at 25 °C only
 *
 * @param options.ion ion symbol without charge, for instance 'K' or 'SO4'
 * @param options.temperatureC temperature, °C, 5 to 55 for the seven ions above, 25 exactly for the others
 * @returns limiting equivalent conductivity, S·cm²/equivalent
 * @throws OutOfDomainError outside these temperatures
 * Accuracy: 0.1 % for the seven (KCl, the best known, 0.04 %); 0.2 % for the others; 1 % for OH.
 * Source: harned-owen (cubics), crc-ionic-conductivity (25 °C).
 * @example limitingIonicConductivity({ ion: 'K', temperatureC: 25 }) // ≈ 73.50
 */
export function limitingIonicConductivity(options: { ion: Ion; temperatureC: number }): number {
  const { ion, temperatureC } = options;
  if (!Object.hasOwn(CHARGE, ion)) throw new InvalidInputError(`Unknown ion ${String(ion)}.`);
  requireWithin('temperature', temperatureC, '°C', LOWEST_C, HIGHEST_C);
  const cubic = cubicOf(ion);
  if (cubic !== undefined) return evaluateCubic(cubic, temperatureC);
  if (temperatureC !== 25) throw only25(`temperature for the ion ${ion}`, temperatureC);
  return at25(ion);
}

function only25(quantity: string, value: number): OutOfDomainError {
  const advice = 'Its limiting conductivity is known at 25 °C only.';
  return new OutOfDomainError({ quantity, value, unit: '°C', lower: 25, upper: 25, advice });
}

function evaluateCubic(
  [l25, a, b, c]: readonly [number, number, number, number],
  temperatureC: number,
): number {
  const d = temperatureC - 25;
  return l25 + d * (a + d * (b + d * c));
}

/**
 * Limiting EQUIVALENT conductivities of a salt's two ions, from one source for both: the cubics when both
 * ions have one, the 25 °C list otherwise, so that two sets of values never mix in one salt.
 *
 * @param options.salt formula, one of `salts`
 * @param options.temperatureC temperature, °C, 5 to 55 (cubic salts) or 25
 * @returns conductivity of cation and anion, S·cm²/equivalent
 * @throws OutOfDomainError outside these temperatures
 * Accuracy: as limitingIonicConductivity.
 * Source: harned-owen, crc-ionic-conductivity.
 * @example limitingEquivalents({ salt: 'CaCl2', temperatureC: 25 }).cation // ≈ 59.47
 */
export function limitingEquivalents(options: { salt: Salt; temperatureC: number }): {
  cation: number;
  anion: number;
} {
  const { salt, temperatureC } = options;
  const { cation, anion } = saltComposition(salt);
  requireWithin('temperature', temperatureC, '°C', LOWEST_C, HIGHEST_C);
  const ofCation = cubicOf(cation);
  const ofAnion = cubicOf(anion);
  if (ofCation !== undefined && ofAnion !== undefined) {
    return { cation: evaluateCubic(ofCation, temperatureC), anion: evaluateCubic(ofAnion, temperatureC) };
  }
  if (temperatureC !== 25) throw only25(`temperature for ${salt}`, temperatureC);
  return { cation: at25(cation), anion: at25(anion) };
}

/**
 * Limiting molar conductivity of a salt: what its conductivity per mole tends to as it is diluted.
 *
 * Lambda0(molar) = equivalents per mole x (lambda(cation) + lambda(anion))
 *
 * @param options.salt formula: KCl, NaCl, LiCl, HCl, KBr, KI and the other pairs of K, Na, Li, H with Cl, Br, I from 5 to 55 °C; the rest of `salts` at 25 °C
 * @param options.temperatureC temperature, °C
 * @returns limiting conductivity per MOLE of salt, S·cm²/mol (CaCl2 counts both equivalents)
 * @throws OutOfDomainError outside these temperatures
 * Accuracy: 0.04 % for KCl (sources give 149.79 to 149.87 at 25 °C), 0.1 % for other 1:1 salts, 0.2 % for the rest.
 * Source: harned-owen, crc-ionic-conductivity.
 * @example limitingMolarConductivity({ salt: 'KCl', temperatureC: 25 }) // ≈ 149.85
 */
export function limitingMolarConductivity(options: { salt: Salt; temperatureC: number }): number {
  const { cation, anion } = limitingEquivalents(options);
  return saltComposition(options.salt).equivalentsPerMole * (cation + anion);
}

/**
 * Limiting molar conductivity of KCl from 0 to 55 °C, the cubic carried 5 K below its measured range for the
 * dilute KCl model, where only its RATIO to 25 °C is used and the molal table confirms the result to 0.1 %.
 *
 * @param temperatureC temperature, °C, 0 to 55
 * @returns S·cm²/mol
 * @throws OutOfDomainError outside 0 to 55 °C
 * Accuracy: 0.04 % from 5 °C, 0.1 % below.
 * Source: harned-owen.
 * @example kclLimitingConductivityFromZero(0) // ≈ 81.66
 */
export function kclLimitingConductivityFromZero(temperatureC: number): number {
  requireWithin('temperature', temperatureC, '°C', 0, HIGHEST_C);
  return evaluateCubic(CUBIC.K, temperatureC) + evaluateCubic(CUBIC.Cl, temperatureC);
}

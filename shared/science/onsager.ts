/**
 * The limiting law of conductance: how the ionic atmosphere slows ions down, and where the law stops being true.
 */
import { InvalidInputError, OutOfDomainError, requirePositive, requireWithin } from './errors.ts';
import { limitingEquivalents, saltComposition } from './electrolytes.ts';
import type { Salt, SaltComposition } from './electrolytes.ts';
import { refuseBeyondValidity } from './onsager-validity.ts';
import { constant } from './references.ts';
import { waterPermittivity, waterViscosity } from './water.ts';

const ELEMENTARY_CHARGE = constant(1.602176634e-19, 'C', 'codata-2022').value;
const BOLTZMANN = constant(1.380649e-23, 'J/K', 'codata-2022').value;
const AVOGADRO = constant(6.02214076e23, '1/mol', 'codata-2022').value;
const VACUUM_PERMITTIVITY = constant(8.8541878188e-12, 'F/m', 'codata-2022').value;
const FARADAY = ELEMENTARY_CHARGE * AVOGADRO;
const ZERO_CELSIUS_K = constant(273.15, 'K', 'its-90').value;

export type Solvent = { temperatureC: number; relativePermittivity?: number; viscosityMPaS?: number };

type SolventInSi = { kelvin: number; permittivity: number; viscosity: number };

/** Water unless both properties of another solvent are given: half a solvent would be neither. */
function solventInSi({ temperatureC, relativePermittivity, viscosityMPaS }: Solvent): SolventInSi {
  if ((relativePermittivity === undefined) !== (viscosityMPaS === undefined)) {
    throw new InvalidInputError(
      'Give both relativePermittivity and viscosityMPaS of the solvent, or neither for water.',
    );
  }
  requireWithin('temperature', temperatureC, '°C', 0, 100);
  const relative = requireWithin(
    'relative permittivity',
    relativePermittivity ?? waterPermittivity(temperatureC),
    '',
    1,
    200,
  );
  const viscosity =
    requirePositive('viscosity', viscosityMPaS ?? waterViscosity(temperatureC), 'mPa·s') / 1000;
  return { kelvin: temperatureC + ZERO_CELSIUS_K, permittivity: VACUUM_PERMITTIVITY * relative, viscosity };
}

/** Reciprocal thickness of the ionic atmosphere, 1/m, at an ionic strength of 1 mol/L. */
function inverseDebyeLength({ kelvin, permittivity }: SolventInSi, ionicStrengthMolL: number): number {
  const numerator = 2 * ELEMENTARY_CHARGE ** 2 * AVOGADRO * 1000 * ionicStrengthMolL;
  return Math.sqrt(numerator / (permittivity * BOLTZMANN * kelvin));
}

/**
 * The mobility factor of the relaxation effect: the only place where the two ions' speeds enter.
 *
 * q = |z1 z2|/(|z1| + |z2|) (l1 + l2)/(|z2| l1 + |z1| l2)
 *
 * @param options.cationCharge z1 and options.anionCharge |z2|, whole positive numbers
 * @param options.cation l1 and options.anion l2, limiting EQUIVALENT conductivities, S·cm²/equivalent
 * @returns q, a pure number; 1/2 for every symmetric salt
 * @throws OutOfDomainError when an input is not positive
 * Accuracy: exact.
 * Source: onsager-1927.
 * @example mobilityFactor({ cationCharge: 2, anionCharge: 1, cation: 59.47, anion: 76.31 }) // ≈ 0.4268
 */
export function mobilityFactor(options: {
  cationCharge: number;
  anionCharge: number;
  cation: number;
  anion: number;
}): number {
  const z1 = requirePositive('charge of the cation', options.cationCharge, '');
  const z2 = requirePositive('charge of the anion', options.anionCharge, '');
  const l1 = requirePositive('conductivity of the cation', options.cation, 'S·cm²/equivalent');
  const l2 = requirePositive('conductivity of the anion', options.anion, 'S·cm²/equivalent');
  return ((z1 * z2) / (z1 + z2)) * ((l1 + l2) / (z2 * l1 + z1 * l2));
}

/** Relaxation term at inverse atmosphere thickness kappaD, as a fraction of the limiting conductivity. */
function relaxationFraction(solvent: SolventInSi, chargeProduct: number, q: number, kappaD: number): number {
  const { permittivity, kelvin } = solvent;
  const strength =
    (chargeProduct * ELEMENTARY_CHARGE ** 2 * kappaD) / (12 * Math.PI * permittivity * BOLTZMANN * kelvin);
  return (strength * q) / (1 + Math.sqrt(q));
}

/** Electrophoretic term at inverse atmosphere thickness kappaD, S cm²/equivalent. */
function electrophoreticLoss({ viscosity }: SolventInSi, chargeSum: number, kappaD: number): number {
  const SQUARE_CM_PER_SQUARE_M = 1e4;
  return (
    (SQUARE_CM_PER_SQUARE_M * chargeSum * FARADAY * ELEMENTARY_CHARGE * kappaD) / (6 * Math.PI * viscosity)
  );
}

export type EquivalentSlopes = { a: number; b: number; q: number };

/**
 * Onsager slopes of any valence type, for the EQUIVALENT conductivity against the square root of the EQUIVALENT concentration.
 *
 * Lambda_eq = L0 - (A + B L0) sqrt(c_eq)
 * A = (|z1| + |z2|) F e kD/(6 pi eta);  B = |z1 z2| e² kD/(12 pi eps0 epsr k T) q/(1 + sqrt q);  kD at 1 equivalent/L
 *
 * @param options.composition charges and numbers of the ions, from saltComposition
 * @param options.cation options.anion limiting equivalent conductivities, S·cm²/equivalent (their ratio fixes q)
 * @param options.temperatureC °C, 0 to 100; options.relativePermittivity and options.viscosityMPaS of another solvent, both or neither
 * @returns a in S·cm²·equivalent⁻¹·(equivalent/L)^−½, b in (equivalent/L)^−½, q a pure number
 * @throws OutOfDomainError outside these ranges
 * Accuracy: that of the solvent's viscosity and permittivity (0.7 % on A between old and new water viscosities).
 * Source: onsager-1927; robinson-stokes ch. 7.
 * @example onsagerEquivalentSlopes({ composition: saltComposition('CaCl2'), cation: 59.47, anion: 76.31, temperatureC: 25 }).b // ≈ 0.4959
 */
export function onsagerEquivalentSlopes(
  options: Solvent & { composition: SaltComposition; cation: number; anion: number },
): EquivalentSlopes {
  const { composition, cation, anion } = options;
  const { cationCharge, anionCharge, equivalentsPerMole } = composition;
  const solvent = solventInSi(options);
  const kappaD = inverseDebyeLength(solvent, ionicStrength(composition, 1 / equivalentsPerMole));
  const q = mobilityFactor({ cationCharge, anionCharge, cation, anion });
  return {
    a: electrophoreticLoss(solvent, cationCharge + anionCharge, kappaD),
    b: relaxationFraction(solvent, cationCharge * anionCharge, q, kappaD),
    q,
  };
}

function ionicStrength(salt: SaltComposition, concentrationMolL: number): number {
  const { cationsPerMole, anionsPerMole, cationCharge, anionCharge } = salt;
  return (concentrationMolL * (cationsPerMole * cationCharge ** 2 + anionsPerMole * anionCharge ** 2)) / 2;
}

/** Any 1:1 salt: q is one half whatever the mobilities, so equal ones stand for all. */
const ONE_TO_ONE: SaltComposition = saltComposition('KCl');

/**
 * Onsager's two coefficients for a 1:1 electrolyte.
 *
 * Lambda = L0 - (A + B L0) sqrt(c);  A = 2 F e kD/(6 pi eta);  B = e² kD/(12 pi eps0 epsr k T) (1/2)/(1 + sqrt(1/2));  kD at 1 mol/L
 *
 * @param options.temperatureC temperature, °C, 0 to 100
 * @param options.relativePermittivity of another solvent, 1 to 200 (with the viscosity; water when neither is given)
 * @param options.viscosityMPaS viscosity of that solvent, mPa·s, above 0
 * @returns a in S·cm²·mol⁻¹·(mol/L)^−½, b in (mol/L)^−½
 * @throws OutOfDomainError outside these ranges, InvalidInputError when half a solvent is given
 * Accuracy: 0.1 %; A is 60.63 with the viscosity of iapws-sr6-08 and 60.20 with the 0.8949 mPa·s of older handbooks.
 * Source: onsager-1927.
 * @example onsagerCoefficients({ temperatureC: 25 }).a // ≈ 60.63
 * @example onsagerCoefficients({ temperatureC: 25, relativePermittivity: 24.3, viscosityMPaS: 1.08 }).b // ≈ 1.330
 */
export function onsagerCoefficients(options: Solvent): { a: number; b: number } {
  const { a, b } = onsagerEquivalentSlopes({ ...options, composition: ONE_TO_ONE, cation: 1, anion: 1 });
  return { a, b };
}

const SHORT_A = constant(82.5, 'S cm²/mol (mol/L)^-1/2 poise K^1/2', 'robinson-stokes').value;
const SHORT_B = constant(8.2e5, '(mol/L)^-1/2 K^3/2', 'robinson-stokes').value;

/**
 * The 1:1 coefficients in the short form of the textbooks, a check on the general ones.
 *
 * A = 82.5/(eta sqrt(eps T)), eta in poise;  B = 8.20e5/(eps T)^1.5
 *
 * @param options as onsagerCoefficients
 * @returns as onsagerCoefficients
 * @throws as onsagerCoefficients
 * Accuracy: the three digits of its factors, 0.05 %.
 * Source: robinson-stokes.
 * @example onsagerShortForm({ temperatureC: 25 }).a // ≈ 60.64
 */
export function onsagerShortForm(options: Solvent): { a: number; b: number } {
  const { kelvin, permittivity, viscosity } = solventInSi(options);
  const epsT = (permittivity / VACUUM_PERMITTIVITY) * kelvin;
  const poise = viscosity * 10;
  return { a: SHORT_A / (poise * Math.sqrt(epsT)), b: SHORT_B / epsT ** 1.5 };
}

/**
 * Molar conductivity of a dilute salt solution by the limiting law.
 *
 * Lambda_eq = L0 (1 - r) - s;  Lambda_m = nu1 |z1| Lambda_eq
 * r = |z1 z2| e² kD/(12 pi eps0 epsr k T) q/(1 + sqrt q);  s = (|z1| + |z2|) F e kD/(6 pi eta)
 *
 * @param options.salt formula, one of `salts`
 * @param options.concentrationMolL moles (not equivalents) per litre, 0 to 5e-3 for 1:1, 0 to 2.5e-3 for 2:1 and 1:2
 * @param options.temperatureC temperature, °C, 5 to 55 or 25, as limitingMolarConductivity
 * @param options.beyondValidity true to see what the law says where it is known to be wrong
 * @returns conductivity per MOLE, S·cm²/mol
 * @throws OutOfDomainError beyond validity, or wherever the law would give zero or less; RefusedModelError for 2:2 salts
 * Accuracy: onsagerValidity; 0.1 % to 1e-3 mol/L for 1:1.
 * Source: onsager-1927; robinson-stokes ch. 7.
 * @example onsagerMolarConductivity({ salt: 'KCl', concentrationMolL: 0.001, temperatureC: 25 }) // ≈ 146.844
 */
export function onsagerMolarConductivity(options: {
  salt: Salt;
  concentrationMolL: number;
  temperatureC: number;
  beyondValidity?: boolean;
}): number {
  const { salt, concentrationMolL, temperatureC, beyondValidity = false } = options;
  requireWithin('concentration', concentrationMolL, 'mol/L', 0, 20);
  if (!beyondValidity) refuseBeyondValidity(salt, concentrationMolL);
  const composition = saltComposition(salt);
  const { cation, anion } = limitingEquivalents({ salt, temperatureC });
  const { a, b } = onsagerEquivalentSlopes({ composition, cation, anion, temperatureC });
  const limiting = cation + anion;
  const root = Math.sqrt(concentrationMolL * composition.equivalentsPerMole);
  const equivalent = limiting - (a + b * limiting) * root;
  if (equivalent <= 0) {
    throw new OutOfDomainError({
      quantity: `concentration of ${salt} for the limiting law`,
      value: concentrationMolL,
      unit: 'mol/L',
      lower: 0,
      upper: (limiting / (a + b * limiting)) ** 2 / composition.equivalentsPerMole,
      advice: 'The law gives a conductivity of zero or less there.',
    });
  }
  return composition.equivalentsPerMole * equivalent;
}

/**
 * Relaxation time of the ionic atmosphere: how long the cloud of counter-ions takes to follow a change of field.
 *
 * theta = eps0 epsr/kappa, kappa = c Lambda in SI
 *
 * @param options.concentrationMolL concentration, mol/L, above 0
 * @param options.molarConductivity molar conductivity, S·cm²/mol, above 0
 * @param options.temperatureC temperature, °C, 0 to 100
 * @param options.relativePermittivity of another solvent; that of water when not given
 * @returns time, s
 * @throws OutOfDomainError outside these ranges
 * Accuracy: that of the permittivity; the permittivity lowered by the salt is neglected (1 % at 0.1 mol/L).
 * Source: debye-falkenhagen-1928.
 * @example relaxationTime({ concentrationMolL: 0.001, molarConductivity: 149.85, temperatureC: 25 }) // ≈ 4.63e-8
 */
export function relaxationTime(options: {
  concentrationMolL: number;
  molarConductivity: number;
  temperatureC: number;
  relativePermittivity?: number;
}): number {
  const { temperatureC, relativePermittivity } = options;
  const concentration = requirePositive('concentration', options.concentrationMolL, 'mol/L');
  const molar = requirePositive('molar conductivity', options.molarConductivity, 'S·cm²/mol');
  requireWithin('temperature', temperatureC, '°C', 0, 100);
  const relative = requireWithin(
    'relative permittivity',
    relativePermittivity ?? waterPermittivity(temperatureC),
    '',
    1,
    200,
  );
  const S_PER_M = 0.1;
  return (VACUUM_PERMITTIVITY * relative) / (concentration * molar * S_PER_M);
}

/** How much of the 1:1 relaxation term is still there at omega theta: Re[(1 + sqrt q)/(1 + sqrt(q (1 + i omega theta)))], q = 1/2. */
function relaxationLeft(omegaTheta: number): number {
  const modulus = Math.hypot(1, omegaTheta);
  const real = Math.SQRT1_2 * Math.sqrt((modulus + 1) / 2);
  const imaginary = Math.SQRT1_2 * Math.sqrt((modulus - 1) / 2);
  return ((1 + Math.SQRT1_2) * (1 + real)) / ((1 + real) ** 2 + imaginary ** 2);
}

const DISPERSION_ALLOWED = constant(1e-4, 'relative', 'bench-practice').value;

/**
 * Highest frequency at which a bridge still measures the low-frequency conductivity of a 1:1 solution.
 *
 * Lambda(omega)/Lambda(0) - 1 = B L0 sqrt(c)/Lambda (1 - g(omega theta)) < d
 * g(x) = Re[(1 + sqrt q)/(1 + sqrt(q (1 + i x)))], q = 1/2; never above 1/(2 pi theta), where displacement current equals conduction
 *
 * @param options.concentrationMolL concentration, mol/L, above 0
 * @param options.molarConductivity molar conductivity, S·cm²/mol, above 0 (stands for L0 too: they differ by 2 % at 0.001 mol/L)
 * @param options.temperatureC temperature, °C, 0 to 100
 * @param options.dispersion d, allowed relative change, 1e-4 unless given, above 0
 * @returns frequency, Hz
 * @throws OutOfDomainError outside these ranges
 * Accuracy: 5 %, as the dispersion follows from the limiting law.
 * Source: debye-falkenhagen-1928.
 * @example highestMeasuringFrequency({ concentrationMolL: 0.001, molarConductivity: 146.9, temperatureC: 25 }) > 1e6 // true
 */
export function highestMeasuringFrequency(options: {
  concentrationMolL: number;
  molarConductivity: number;
  temperatureC: number;
  dispersion?: number;
}): number {
  const dispersion = requirePositive('dispersion', options.dispersion ?? DISPERSION_ALLOWED, '');
  const theta = relaxationTime(options);
  const { b } = onsagerCoefficients({ temperatureC: options.temperatureC });
  const relaxation = b * Math.sqrt(options.concentrationMolL);
  let low = 0;
  let high = 1;
  // Displacement current sets the ceiling omega theta = 1; below it the dispersion rises steadily, so halving finds the limit.
  if (relaxation * (1 - relaxationLeft(high)) > dispersion) {
    const HALVINGS = 50;
    for (let step = 0; step < HALVINGS; step += 1) {
      const middle = (low + high) / 2;
      if (relaxation * (1 - relaxationLeft(middle)) > dispersion) high = middle;
      else low = middle;
    }
  }
  return high / (2 * Math.PI * theta);
}

/**
 * Liquid water at 0.1 MPa: density, viscosity, permittivity and its own conductivity.
 *
 * All three properties come from one formulation, IAPWS SR6-08(2011), so that they never mix
 * scales: older viscosities (0.8949 mPa s at 25 degC) shift the Onsager slope by 0.7 %.
 */
import { requireWithin } from './errors.ts';
import { constant } from './references.ts';

const ZERO_CELSIUS_K = constant(273.15, 'K', 'its-90').value;

const SPECIFIC_GAS_CONSTANT = constant(461.51805, 'J/(kg K)', 'iapws-sr6-08').value;
const REDUCING_TEMPERATURE = constant(10, 'K', 'iapws-sr6-08').value;
const UPPER_POLE = constant(593, 'K', 'iapws-sr6-08').value;
const LOWER_POLE = constant(232, 'K', 'iapws-sr6-08').value;
const REFERENCE_PRESSURE = constant(1e5, 'Pa', 'iapws-sr6-08').value;
const VOLUME_OFFSET = constant(1.93763157e-2, '', 'iapws-sr6-08').value;
const VOLUME_UPPER = constant(
  [
    [6.74458446e3, 4],
    [-2.22521604e5, 5],
    [1.00231247e8, 7],
    [-1.63552118e9, 8],
    [8.32299658e9, 9],
  ],
  'coefficient and power of 10 K/(593 K - T)',
  'iapws-sr6-08',
).value;
const VOLUME_LOWER = constant(
  [
    [5.78545292e-3, 1],
    [-1.53195665e-2, 2],
    [3.11337859e-2, 3],
    [-4.23546241e-2, 4],
    [3.38713507e-2, 5],
    [-1.19946761e-2, 6],
  ],
  'coefficient and power of 10 K/(T - 232 K)',
  'iapws-sr6-08',
).value;
const VISCOSITY = constant(
  [
    [280.68, -1.9],
    [511.45, -7.7],
    [61.131, -19.6],
    [0.45903, -40],
  ],
  'uPa s and power of T/300 K',
  'iapws-sr6-08',
).value;
const PERMITTIVITY = constant(
  [
    [-43.7527, -0.05],
    [299.504, -1.47],
    [-399.364, -2.11],
    [221.327, -2.31],
  ],
  'coefficient and power of T/300 K',
  'iapws-sr6-08',
).value;

/** The formulation is stable liquid water between the ice and steam points; it is not used outside. */
const LOWEST_C = 0;
const HIGHEST_C = 100;

function toKelvin(temperatureC: number): number {
  return requireWithin('temperature of the water', temperatureC, '°C', LOWEST_C, HIGHEST_C) + ZERO_CELSIUS_K;
}

function powerSum(terms: readonly (readonly [number, number])[], base: number): number {
  let sum = 0;
  for (const [coefficient, power] of terms) sum += coefficient * base ** power;
  return sum;
}

/**
 * Density of liquid water at 0.1 MPa.
 *
 * 1/rho = (R Tr/p0) [a5 + sum a_i alpha^n_i + sum b_i beta^m_i], alpha = Tr/(593 K - T), beta = Tr/(T - 232 K)
 * with R the specific gas constant, Tr = 10 K and p0 = 0.1 MPa.
 *
 * @param temperatureC temperature, °C (ITS-90), 0 to 100
 * @returns density, kg/m³
 * @throws OutOfDomainError outside 0 to 100 °C
 * Accuracy: 1e-6 relative from 0 to 40 °C, 2e-5 above.
 * Source: iapws-sr6-08, equation for the specific volume.
 * @example waterDensity(25) // ≈ 997.0470
 */
export function waterDensity(temperatureC: number): number {
  const kelvin = toKelvin(temperatureC);
  const upper = powerSum(VOLUME_UPPER, REDUCING_TEMPERATURE / (UPPER_POLE - kelvin));
  const lower = powerSum(VOLUME_LOWER, REDUCING_TEMPERATURE / (kelvin - LOWER_POLE));
  const volume =
    ((SPECIFIC_GAS_CONSTANT * REDUCING_TEMPERATURE) / REFERENCE_PRESSURE) * (VOLUME_OFFSET + upper + lower);
  return 1 / volume;
}

/**
 * Viscosity of liquid water at 0.1 MPa.
 *
 * eta/uPa s = sum a_i (T/300 K)^b_i
 *
 * @param temperatureC temperature, °C (ITS-90), 0 to 100
 * @returns viscosity, mPa·s
 * @throws OutOfDomainError outside 0 to 100 °C
 * Accuracy: 1 %, and within 0.003 % of the full formulation iapws-r12-08 from 0 to 100 °C.
 * Source: iapws-sr6-08, equation for the viscosity.
 * @example waterViscosity(20) // ≈ 1.00157
 */
export function waterViscosity(temperatureC: number): number {
  return powerSum(VISCOSITY, toKelvin(temperatureC) / 300) / 1000;
}

/**
 * Static relative permittivity of liquid water at 0.1 MPa.
 *
 * eps = sum e_i (T/300 K)^f_i
 *
 * @param temperatureC temperature, °C (ITS-90), 0 to 100
 * @returns relative permittivity, a pure number
 * @throws OutOfDomainError outside 0 to 100 °C
 * Accuracy: 0.01 % near 25 °C. The other IAPWS equation (iapws-r8-97) gives 78.408 at 25 °C, 0.042 % more,
 * and 0.37 % less at 100 °C: the two are never mixed here.
 * Source: iapws-sr6-08, equation for the static dielectric constant.
 * @example waterPermittivity(25) // ≈ 78.375
 */
export function waterPermittivity(temperatureC: number): number {
  return powerSum(PERMITTIVITY, toKelvin(temperatureC) / 300);
}

const ION_PRODUCT = constant(
  [-4.098, -3245.2, 2.2362e5, -3.984e7],
  'log10 of (mol/kg)², by 1/T',
  'iapws-conductivity-1990',
).value;
const ION_PRODUCT_DENSITY = constant(
  [13.957, -1262.3, 8.5641e5],
  'per log10 of density in g/cm³',
  'iapws-conductivity-1990',
).value;
const CONDUCTANCE_AT_ZERO_DENSITY = constant(
  [1850, 1410, 2.16417e-6, 1.81609e-7, -1.75297e-9, 7.20708e-12],
  'S cm²/mol, by t in °C',
  'iapws-conductivity-1990',
).value;
const HYPOTHETICAL_DENSITY = constant(
  [16, 11.6, 3.26e-4, -2.3e-6, 1.1e-8],
  'g/cm³, by t in °C',
  'iapws-conductivity-1990',
).value;

/** The ion product that belongs to the conductivity equation; a newer ion product would unbalance it. */
function ionProduct(kelvin: number, densityGCm3: number): number {
  const [k0, k1, k2, k3] = ION_PRODUCT;
  const [d0, d1, d2] = ION_PRODUCT_DENSITY;
  const atUnitDensity = k0 + k1 / kelvin + k2 / kelvin ** 2 + k3 / kelvin ** 3;
  return 10 ** (atUnitDensity + (d0 + d1 / kelvin + d2 / kelvin ** 2) * Math.log10(densityGCm3));
}

/**
 * Conductivity of pure liquid water from its own ions, at any density (the equation was made for steam cycles).
 *
 * kappa = 1000 rho Lambda0 sqrt(Kw), Lambda0 = Lambda00 (1 - rho/rho_h), rho in g/cm³, kappa in uS/cm
 *
 * @param temperatureC temperature, °C, 0 to 800
 * @param densityKgM3 density, kg/m³, 600 to 1200
 * @returns conductivity, µS/cm
 * @throws OutOfDomainError outside these ranges
 * Accuracy: see pureWaterRelativeUncertainty.
 * Source: iapws-conductivity-1990, equations 1 to 6.
 * @example pureWaterConductivityAtDensity(200, 900) // ≈ 4.19
 */
export function pureWaterConductivityAtDensity(temperatureC: number, densityKgM3: number): number {
  const t = requireWithin('temperature of the water', temperatureC, '°C', 0, 800);
  const density = requireWithin('density of the water', densityKgM3, 'kg/m³', 600, 1200) / 1000;
  const [a0, a1, a2, a3, a4, a5] = CONDUCTANCE_AT_ZERO_DENSITY;
  const [h0, h1, h2, h3, h4] = HYPOTHETICAL_DENSITY;
  const atZeroDensity = a0 - 1 / (1 / a1 + a2 * t + a3 * t ** 2 + a4 * t ** 3 + a5 * t ** 4);
  const hypothetical = h0 - 1 / (1 / h1 + h2 * t + h3 * t ** 2 + h4 * t ** 3);
  const limiting = atZeroDensity * (1 - density / hypothetical);
  return 1000 * density * limiting * Math.sqrt(ionProduct(t + ZERO_CELSIUS_K, density));
}

/**
 * Conductivity of pure water at 0.1 MPa: what is left when everything else has been taken out.
 *
 * kappa = 1000 rho Lambda0 sqrt(Kw), as in pureWaterConductivityAtDensity at the density of liquid water
 *
 * @param temperatureC temperature, °C, 0 to 100
 * @returns conductivity, µS/cm (0.0550 at 25 °C, that is 18.2 MΩ·cm)
 * @throws OutOfDomainError outside 0 to 100 °C
 * Accuracy: pureWaterRelativeUncertainty; published equations and measurements differ by up to 5 % at 10 °C.
 * Source: iapws-conductivity-1990.
 * @example pureWaterConductivity(25) // ≈ 0.0550
 */
export function pureWaterConductivity(temperatureC: number): number {
  return pureWaterConductivityAtDensity(temperatureC, waterDensity(temperatureC));
}

const SPREAD_AT_25 = constant(0.002, 'relative', 'light-2005').value;
const SPREAD_ELSEWHERE = constant(0.02, 'relative', 'light-2005').value;
/** Within this of 25 °C the sources agree on 0.0550. */
const AGREED_WITHIN_K = 1;

/**
 * How well the conductivity of pure water is known: the spread between sources as a relative standard uncertainty.
 *
 * u = 0.2 % within 1 K of 25 °C, 2 % elsewhere
 *
 * @param temperatureC temperature, °C, 0 to 100
 * @returns relative standard uncertainty, a pure number
 * @throws OutOfDomainError outside 0 to 100 °C
 * Accuracy: a judgement. At 25 °C three sources give 0.05499, 0.0550 and 0.05501; at 10 °C 0.0221, 0.0229 and 0.0232.
 * Source: iapws-conductivity-1990 against light-2005.
 * @example pureWaterRelativeUncertainty(40) // 0.02
 */
export function pureWaterRelativeUncertainty(temperatureC: number): number {
  toKelvin(temperatureC);
  return Math.abs(temperatureC - 25) <= AGREED_WITHIN_K ? SPREAD_AT_25 : SPREAD_ELSEWHERE;
}

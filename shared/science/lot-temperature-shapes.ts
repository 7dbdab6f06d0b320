/** How a reference solution's conductivity moves with temperature, by what is known about it; each with the error it may have. */
import { cubicSpline, evaluateSpline } from './cubic-spline.ts';
import { OutOfDomainError, requirePositive } from './errors.ts';
import { diluteKclTemperatureRatio, kclConcentrationAt25 } from './kcl-solutions.ts';
import { kclStandardConductivity } from './kcl-standards.ts';
import type { KclBasis, KclNominal } from './kcl-standards.ts';
import { constant } from './references.ts';

export type LotTemperatureRow = { temperatureC: number; conductivityUsCm: number };

export type LotInterpolation =
  | 'certificate-table'
  | 'certificate-value-only'
  | 'kcl-standard-table'
  | 'kcl-standard-shape'
  | 'kcl-dilute-shape'
  | 'kcl-between-standards-shape';

/** Value and slope in µS/cm and µS/cm per K, and how far the curve may be off (half-width). */
export type TemperatureShape = {
  value: number;
  slope: number;
  relativeHalfWidth: number;
  interpolation: LotInterpolation;
};

/** Curvature of any electrolyte's conductivity against temperature: twice that of KCl. */
const CURVATURE_BOUND = constant(1e-4, 'relative per K²', 'pratt-2001').value;
/** Part of the distance between curve and straight line that a spline through three or more rows may still be wrong by. */
const SPLINE_ERROR_SHARE = constant(0.2, '', 'pratt-2001').value;

/** How far the molal and demal shapes part, per K; the scaled limiting law and the blend between standards are twice as far off. */
const STANDARD_SHAPE_PER_K = constant(2e-5, 'relative per K', 'oiml-r56').value;
const MODEL_SHAPE_PER_K = constant(5e-5, 'relative per K', 'pratt-2001').value;

/** An unknown liquid without a table is known at one temperature; this near to it, 2.5 %/K bounds the change not corrected for. */
const FIXED_POINT_WITHIN_K = constant(0.2, 'K', 'bench-practice').value;
const UNKNOWN_LIQUID_PER_K = constant(0.025, 'relative per K', 'bench-practice').value;
const UNKNOWN_LIQUID_SLOPE_PER_K = constant(0.02, 'relative per K', 'bench-practice').value;

/**
 * The certificate's own table, between its rows.
 *
 * cubic spline; half-width of its error: 1e-4/K² (t - t0)(t1 - t)/2 of the value for two rows, a fifth of its distance from the
 * straight line between the neighbouring rows for more
 *
 * @param table rows with rising temperatures (°C) and conductivities (µS/cm, above 0), at least two
 * @param temperatureC temperature, °C, inside the table
 * @returns value in µS/cm, slope in µS/cm per K, relative half-width
 * @throws OutOfDomainError outside the table, InconsistentInputError when its rows do not rise
 * Accuracy: the half-width returned. Source: the certificate.
 * @example tableShape([{ temperatureC: 20, conductivityUsCm: 1273 }, { temperatureC: 25, conductivityUsCm: 1408 }], 20).value // 1273
 */
export function tableShape(table: readonly LotTemperatureRow[], temperatureC: number): TemperatureShape {
  const x = table.map((row) => row.temperatureC);
  const y = table.map((row) =>
    requirePositive('conductivity in the certificate table', row.conductivityUsCm, 'µS/cm'),
  );
  const spline = cubicSpline(x, y);
  const lower = x[0] as number;
  const upper = x[x.length - 1] as number;
  if (!(temperatureC >= lower && temperatureC <= upper)) {
    throw new OutOfDomainError({
      quantity: 'temperature of the solution',
      value: temperatureC,
      unit: '°C',
      lower,
      upper,
      advice: "The lot's certificate has no value there: bring the solution to a temperature of its table.",
    });
  }
  const { value, slope } = evaluateSpline(spline, temperatureC);
  return {
    value,
    slope,
    relativeHalfWidth: tableErrorBound(x, y, temperatureC, value),
    interpolation: 'certificate-table',
  };
}

function tableErrorBound(
  x: readonly number[],
  y: readonly number[],
  temperatureC: number,
  value: number,
): number {
  let i = 0;
  while (i < x.length - 2 && temperatureC >= (x[i + 1] as number)) i += 1;
  const [x0, x1, y0, y1] = [x[i], x[i + 1], y[i], y[i + 1]] as [number, number, number, number];
  if (x.length === 2) return (CURVATURE_BOUND * (temperatureC - x0) * (x1 - temperatureC)) / 2;
  const straight = y0 + ((y1 - y0) * (temperatureC - x0)) / (x1 - x0);
  return (SPLINE_ERROR_SHARE * Math.abs(value - straight)) / value;
}

/**
 * The temperature shape of a KCl standard; a certified value only scales it.
 *
 * kclStandardConductivity; half-width of the shape: the table's interpolation error and 2e-5 per K from the certified temperature
 *
 * @param standard basis and nominal value
 * @param t temperature and @param referenceC temperature of the certified value, °C, 0 to 50
 * @returns value in µS/cm, slope in µS/cm per K, relative half-width
 * @throws OutOfDomainError outside 0 to 50 °C
 * Accuracy: the half-width returned. Source: pratt-2001, oiml-r56.
 * @example standardShape({ basis: 'molal', nominal: 0.1 }, 25, 25).relativeHalfWidth // 0
 */
export function standardShape(
  { basis, nominal }: { basis: KclBasis; nominal: KclNominal },
  t: number,
  referenceC: number,
): TemperatureShape {
  const { conductivityUsCm, slopeUsCmPerK, interpolationRelativeHalfWidth } = kclStandardConductivity({
    basis,
    nominal,
    temperatureC: t,
  });
  const relativeHalfWidth =
    t === referenceC ? 0 : interpolationRelativeHalfWidth + STANDARD_SHAPE_PER_K * Math.abs(t - referenceC);
  return {
    value: conductivityUsCm,
    slope: slopeUsCmPerK,
    relativeHalfWidth,
    interpolation: 'kcl-standard-shape',
  };
}

const MOLAL_NOMINALS = [0.01, 0.1, 1] as const;
const MOLAL_AT_25 = MOLAL_NOMINALS.map(
  (nominal) => kclStandardConductivity({ basis: 'molal', nominal, temperatureC: 25 }).conductivityUsCm,
) as [number, number, number];

function molalRatio(nominal: KclNominal, temperatureC: number): { ratio: number; ratioPerK: number } {
  const { conductivityUsCm, slopeUsCmPerK } = kclStandardConductivity({
    basis: 'molal',
    nominal,
    temperatureC,
  });
  const at25 = MOLAL_AT_25[MOLAL_NOMINALS.indexOf(nominal)] as number;
  return { ratio: conductivityUsCm / at25, ratioPerK: slopeUsCmPerK / at25 };
}

/** kappa(t)/kappa(25) of aqueous KCl of any strength to 1 mol/kg: the scaled limiting law when dilute, a blend of columns above. */
function kclRatio(
  at25UsCm: number,
  temperatureC: number,
): { ratio: number; ratioPerK: number; isDilute: boolean } {
  const [weak, middle, strong] = MOLAL_AT_25;
  if (at25UsCm <= weak) {
    const concentrationMolL = kclConcentrationAt25(at25UsCm);
    return { ...diluteKclTemperatureRatio({ concentrationMolL, temperatureC }), isDilute: true };
  }
  if (at25UsCm > strong) {
    throw new OutOfDomainError({
      quantity: 'conductivity at 25 °C of aqueous KCl without a temperature table',
      value: at25UsCm,
      unit: 'µS/cm',
      lower: 0,
      upper: strong,
      advice: "Enter the temperature table of the lot's certificate.",
    });
  }
  const [lower, upper, from, to] =
    at25UsCm <= middle ? ([0.01, 0.1, weak, middle] as const) : ([0.1, 1, middle, strong] as const);
  const share = Math.log(at25UsCm / from) / Math.log(to / from);
  const a = molalRatio(lower, temperatureC);
  const b = molalRatio(upper, temperatureC);
  return {
    ratio: a.ratio + share * (b.ratio - a.ratio),
    ratioPerK: a.ratioPerK + share * (b.ratioPerK - a.ratioPerK),
    isDilute: false,
  };
}

/** The conductivity at 25 °C of a KCl lot certified at another temperature; the ratio hardly depends on it, so few turns do. */
function certifiedAt25(certifiedUsCm: number, referenceC: number): number {
  if (referenceC === 25) return certifiedUsCm;
  const TURNS = 3;
  let at25 = certifiedUsCm / molalRatio(0.01, referenceC).ratio;
  for (let turn = 0; turn < TURNS; turn += 1) at25 = certifiedUsCm / kclRatio(at25, referenceC).ratio;
  return at25;
}

/**
 * The temperature shape of aqueous KCl of any strength to 1 mol/kg, found from its certified conductivity.
 *
 * scaled limiting law to 0.01 mol/kg, blend of the molal columns in ln kappa above; half-width 5e-5 per K from the certified temperature
 *
 * @param certifiedUsCm certified conductivity, µS/cm, to 108 620 at 25 °C
 * @param temperatureC temperature and @param referenceC temperature of the certified value, °C, 0 to 50
 * @returns value in µS/cm, slope in µS/cm per K, relative half-width
 * @throws OutOfDomainError outside these ranges
 * Accuracy: the half-width returned. Source: pratt-2001, onsager-1927.
 * @example anyKclShape(84, 20, 25).value // ≈ 75.90
 */
export function anyKclShape(
  certifiedUsCm: number,
  temperatureC: number,
  referenceC: number,
): TemperatureShape {
  const at25 = certifiedAt25(certifiedUsCm, referenceC);
  const { ratio, ratioPerK, isDilute } = kclRatio(at25, temperatureC);
  return {
    value: at25 * ratio,
    slope: at25 * ratioPerK,
    relativeHalfWidth: MODEL_SHAPE_PER_K * Math.abs(temperatureC - referenceC),
    interpolation: isDilute ? 'kcl-dilute-shape' : 'kcl-between-standards-shape',
  };
}

/**
 * A liquid that is known at one temperature only.
 *
 * kappa_cert within 0.2 K; half-width 2.5 %/K of the distance, for the change that is not corrected
 *
 * @param certifiedUsCm certified conductivity, µS/cm
 * @param temperatureC temperature and @param referenceC temperature of the certified value, °C
 * @returns value in µS/cm, slope of 2 %/K in µS/cm per K, relative half-width
 * @throws OutOfDomainError further than 0.2 K from the certified temperature
 * Accuracy: the half-width returned. Source: bench-practice.
 * @example fixedPoint(500, 25.1, 25).value // 500
 */
export function fixedPoint(
  certifiedUsCm: number,
  temperatureC: number,
  referenceC: number,
): TemperatureShape {
  const apart = Math.abs(temperatureC - referenceC);
  if (!(apart <= FIXED_POINT_WITHIN_K)) {
    throw new OutOfDomainError({
      quantity: 'temperature of the solution',
      value: temperatureC,
      unit: '°C',
      lower: referenceC - FIXED_POINT_WITHIN_K,
      upper: referenceC + FIXED_POINT_WITHIN_K,
      advice:
        "This liquid is not aqueous KCl and its certificate has no temperature table: bring it to the certificate's temperature.",
    });
  }
  return {
    value: certifiedUsCm,
    slope: UNKNOWN_LIQUID_SLOPE_PER_K * certifiedUsCm,
    relativeHalfWidth: UNKNOWN_LIQUID_PER_K * apart,
    interpolation: 'certificate-value-only',
  };
}

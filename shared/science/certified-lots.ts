/**
 * The true conductivity of a bottle: what its certificate says at its temperature, and nothing the certificate does not know.
 *
 * A lot's own table is read between its rows and never beyond them. A certified value of aqueous KCl without a table follows the
 * temperature SHAPE of its KCl basis. Any other liquid has one temperature only.
 */
import { InconsistentInputError, InvalidInputError, requireFinite, requirePositive } from './errors.ts';
import { kclStandardConductivity, kclStandardLabel } from './kcl-standards.ts';
import type { KclBasis, KclNominal } from './kcl-standards.ts';
import { anyKclShape, fixedPoint, standardShape, tableShape } from './lot-temperature-shapes.ts';
import type { LotInterpolation, LotTemperatureRow, TemperatureShape } from './lot-temperature-shapes.ts';
import { citation, constant } from './references.ts';

export type { LotInterpolation, LotTemperatureRow } from './lot-temperature-shapes.ts';

export type CertifiedLot = {
  medium: 'kcl-aqueous' | 'other';
  basis: KclBasis | 'other';
  nominal: KclNominal | null;
  /** At referenceTemperatureC; null when the bottle has only its basis and nominal value. */
  certifiedConductivityUsCm: number | null;
  referenceTemperatureC: number;
  /** U of the certified value, µS/cm; null when the certificate states none. */
  expandedUncertaintyUsCm: number | null;
  /** k of that U; null is taken as 2. */
  coverageFactor: number | null;
  temperatureTable: readonly LotTemperatureRow[] | null;
};

export type LotReference = {
  conductivityUsCm: number;
  /** Of the value and of the reading between known temperatures, together. */
  standardUncertaintyUsCm: number;
  /** In words, for a record. */
  source: string;
  interpolation: LotInterpolation;
  valueStandardUncertaintyUsCm: number;
  interpolationStandardUncertaintyUsCm: number;
  slopeUsCmPerK: number;
};

const DEFAULT_COVERAGE_FACTOR = constant(2, '', 'gum-2008').value;
/** Bottles whose label states no uncertainty are sold to 1 %: half-width of a rectangular distribution. */
const UNSTATED_RELATIVE_HALF_WIDTH = constant(0.01, 'relative', 'bench-practice').value;

/** A certificate whose table and value differ by more was copied wrongly. */
const LARGEST_CONTRADICTION = constant(5e-3, 'relative', 'bench-practice').value;

/** Distances at which a label's basis is doubted, and another one recognised. */
const BASIS_DOUBTED_FROM = constant(2e-3, 'relative', 'bench-practice').value;
const BASIS_RECOGNISED_WITHIN = constant(1e-3, 'relative', 'bench-practice').value;

function standardOf(lot: CertifiedLot): { basis: KclBasis; nominal: KclNominal } | null {
  if (lot.medium !== 'kcl-aqueous' || lot.basis === 'other' || lot.nominal === null) return null;
  return { basis: lot.basis, nominal: lot.nominal };
}

/** Relative standard uncertainty of the certified value. */
function certifiedUncertainty(lot: CertifiedLot, valueUsCm: number): number {
  if (lot.expandedUncertaintyUsCm === null) return UNSTATED_RELATIVE_HALF_WIDTH / Math.sqrt(3);
  const expanded = requirePositive('expanded uncertainty of the lot', lot.expandedUncertaintyUsCm, 'µS/cm');
  const k = requirePositive('coverage factor of the lot', lot.coverageFactor ?? DEFAULT_COVERAGE_FACTOR, '');
  return expanded / k / valueUsCm;
}

function assemble(
  shape: TemperatureShape,
  value: number,
  slope: number,
  relativeU: number,
  source: string,
): LotReference {
  const valueU = relativeU * value;
  const interpolationU = (shape.relativeHalfWidth * value) / Math.sqrt(3);
  return {
    conductivityUsCm: value,
    standardUncertaintyUsCm: Math.hypot(valueU, interpolationU),
    source,
    interpolation: shape.interpolation,
    valueStandardUncertaintyUsCm: valueU,
    interpolationStandardUncertaintyUsCm: interpolationU,
    slopeUsCmPerK: slope,
  };
}

function byTable(lot: CertifiedLot, table: readonly LotTemperatureRow[], temperatureC: number): LotReference {
  const shape = tableShape(table, temperatureC);
  const nearest = table.reduce((best, row) =>
    Math.abs(row.temperatureC - lot.referenceTemperatureC) <
    Math.abs(best.temperatureC - lot.referenceTemperatureC)
      ? row
      : best,
  );
  const certified = lot.certifiedConductivityUsCm ?? nearest.conductivityUsCm;
  requirePositive('certified conductivity', certified, 'µS/cm');
  if (
    nearest.temperatureC === lot.referenceTemperatureC &&
    Math.abs(nearest.conductivityUsCm / certified - 1) > LARGEST_CONTRADICTION
  ) {
    throw new InconsistentInputError({
      quantity: 'Lot certificate',
      reason: `it certifies ${certified} µS/cm at ${lot.referenceTemperatureC} °C and its table says ${nearest.conductivityUsCm}`,
      advice: 'Compare both with the certificate.',
    });
  }
  return assemble(
    shape,
    shape.value,
    shape.slope,
    certifiedUncertainty(lot, certified),
    "The lot's certificate, its own temperature table",
  );
}

function byCertifiedValue(lot: CertifiedLot, certifiedUsCm: number, temperatureC: number): LotReference {
  const certified = requirePositive('certified conductivity', certifiedUsCm, 'µS/cm');
  const referenceC = lot.referenceTemperatureC;
  const relativeU = certifiedUncertainty(lot, certified);
  if (lot.medium !== 'kcl-aqueous') {
    const shape = fixedPoint(certified, temperatureC, referenceC);
    return assemble(shape, shape.value, shape.slope, relativeU, "The lot's certificate, its certified value");
  }
  const standard = standardOf(lot);
  if (standard === null) {
    const shape = anyKclShape(certified, temperatureC, referenceC);
    return assemble(
      shape,
      shape.value,
      shape.slope,
      relativeU,
      "The lot's certificate, temperature shape of aqueous KCl of that strength",
    );
  }
  const shape = standardShape(standard, temperatureC, referenceC);
  const scale =
    certified / kclStandardConductivity({ ...standard, temperatureC: referenceC }).conductivityUsCm;
  const source = `The lot's certificate, temperature shape of KCl ${standard.nominal} ${standard.basis}`;
  return assemble(shape, shape.value * scale, shape.slope * scale, relativeU, source);
}

/** A lot without any certified value: the table of its basis, with the larger of the table's and the lot's own uncertainty. */
function byStandard(lot: CertifiedLot, temperatureC: number): LotReference {
  const standard = standardOf(lot);
  if (standard === null) {
    throw new InvalidInputError(
      'This lot has neither a certified value, nor a temperature table, nor a KCl basis with 0.01, 0.1 or 1: enter one of them.',
    );
  }
  const at = kclStandardConductivity({ ...standard, temperatureC });
  const own =
    lot.expandedUncertaintyUsCm === null ? 0 : certifiedUncertainty(lot, standardAtReference(standard, lot));
  const shape: TemperatureShape = {
    value: at.conductivityUsCm,
    slope: at.slopeUsCmPerK,
    relativeHalfWidth: at.interpolationRelativeHalfWidth,
    interpolation: 'kcl-standard-table',
  };
  const relativeU = Math.max(at.relativeStandardUncertainty, own);
  return assemble(shape, shape.value, shape.slope, relativeU, citation(at.source));
}

const standardAtReference = (standard: { basis: KclBasis; nominal: KclNominal }, lot: CertifiedLot): number =>
  kclStandardConductivity({ ...standard, temperatureC: lot.referenceTemperatureC }).conductivityUsCm;

/**
 * The conductivity that a lot of reference solution has at a temperature.
 *
 * with a table: cubic spline through its rows, inside them only. Certified KCl without a table: kappa_cert s(t)/s(t_ref), s the shape
 * of the lot's basis (or of KCl of that strength). KCl without a certificate: kclStandardConductivity. Other liquids without a
 * table: the certified value within 0.2 K of its temperature
 *
 * @param options.lot medium, basis, nominal, certified value in µS/cm with U and k, reference temperature in °C, temperature table or null
 * @param options.temperatureC temperature of the solution, °C: inside the table, or 0 to 50 for KCl without one
 * @returns conductivity and standard uncertainty in µS/cm, the two parts of that uncertainty, slope in µS/cm per K, source and interpolation
 * @throws OutOfDomainError outside the table or range, InconsistentInputError when table and certified value differ by over 0.5 %,
 *   InvalidInputError for a lot that states no value at all
 * Accuracy: the certificate's U/k (k = 2 when it states none; 1 % half-width when it states no U), and the interpolation's.
 * Source: the certificate; pratt-2001 and oiml-r56 for the shapes.
 * @example lotReferenceConductivity({ lot: { medium: 'kcl-aqueous', basis: 'molal', nominal: 0.01, certifiedConductivityUsCm: 1409, referenceTemperatureC: 25, expandedUncertaintyUsCm: 2.8, coverageFactor: 2, temperatureTable: null }, temperatureC: 20 }).conductivityUsCm // ≈ 1273.73
 */
export function lotReferenceConductivity(options: { lot: CertifiedLot; temperatureC: number }): LotReference {
  const { lot, temperatureC } = options;
  requireFinite('temperature of the solution', temperatureC, '°C');
  requireFinite('reference temperature of the lot', lot.referenceTemperatureC, '°C');
  if (lot.temperatureTable !== null) return byTable(lot, lot.temperatureTable, temperatureC);
  if (lot.certifiedConductivityUsCm !== null)
    return byCertifiedValue(lot, lot.certifiedConductivityUsCm, temperatureC);
  return byStandard(lot, temperatureC);
}

/**
 * The name of a lot that cannot be mistaken for another basis: nominal, basis and the value it stands for.
 *
 * @param options.lot as lotReferenceConductivity
 * @returns text
 * @throws InvalidInputError for a lot that states no value at all
 * Accuracy: the certified value as stated.
 * Source: the certificate.
 * @example lotLabel({ lot: { medium: 'kcl-aqueous', basis: 'other', nominal: null, certifiedConductivityUsCm: 84, referenceTemperatureC: 25, expandedUncertaintyUsCm: 0.8, coverageFactor: 2, temperatureTable: null } }) // "KCl, 84 µS/cm at 25 °C"
 */
export function lotLabel({ lot }: { lot: CertifiedLot }): string {
  const standard = standardOf(lot);
  const liquid = lot.medium === 'kcl-aqueous' ? 'KCl' : 'Other liquid';
  const name = standard === null ? liquid : (kclStandardLabel(standard).split(',')[0] as string);
  if (lot.certifiedConductivityUsCm !== null) {
    return `${name}, ${lot.certifiedConductivityUsCm} µS/cm at ${lot.referenceTemperatureC} °C`;
  }
  if (standard !== null) return kclStandardLabel(standard);
  const { conductivityUsCm } = lotReferenceConductivity({ lot, temperatureC: lot.referenceTemperatureC });
  return `${name}, ${Math.round(conductivityUsCm * 100) / 100} µS/cm at ${lot.referenceTemperatureC} °C`;
}

/**
 * The other basis that a certified value fits better than the basis on the label: demal taken for molal, molal for molar.
 *
 * compares the certified value with the three bases' values at its temperature
 *
 * @param options.lot as lotReferenceConductivity
 * @returns the basis it fits within 0.1 % while the stated one is further than 0.2 % away, or null
 * @throws OutOfDomainError when the reference temperature is outside 0 to 50 °C
 * Accuracy: 0.01 mol/kg and 0.01 D are too alike to be told apart.
 * Source: pratt-2001, oiml-r56, juhasz-marsh-1981.
 * @example suspectedBasis({ lot: { medium: 'kcl-aqueous', basis: 'molal', nominal: 0.01, certifiedConductivityUsCm: 1413, referenceTemperatureC: 25, expandedUncertaintyUsCm: 5, coverageFactor: 2, temperatureTable: null } }) // "molar"
 */
export function suspectedBasis({ lot }: { lot: CertifiedLot }): KclBasis | null {
  const standard = standardOf(lot);
  const certified = lot.certifiedConductivityUsCm;
  if (standard === null || certified === null) return null;
  const distance = (basis: KclBasis): number => {
    const at = kclStandardConductivity({
      basis,
      nominal: standard.nominal,
      temperatureC: lot.referenceTemperatureC,
    });
    return Math.abs(certified / at.conductivityUsCm - 1);
  };
  if (distance(standard.basis) <= BASIS_DOUBTED_FROM) return null;
  return (
    (['molal', 'demal', 'molar'] as const).find((basis) => distance(basis) <= BASIS_RECOGNISED_WITHIN) ?? null
  );
}

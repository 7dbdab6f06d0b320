/** Cell constants: from a reference solution, from an indication, and through an inductive probe's mounting. */
import {
  OutOfDomainError,
  RefusedModelError,
  requireCount,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from './errors.ts';
import { constant } from './references.ts';

/** Cells of the trade run from 0.01 to 10 per cm; beyond these a record probably holds the inverse (cm), or a unit was lost. */
const LOWEST_PER_CM = constant(1e-3, 'cm⁻¹', 'bench-practice').value;
const HIGHEST_PER_CM = constant(100, 'cm⁻¹', 'bench-practice').value;

const SWAPPED = 'Check that it is stated per cm (not in cm, and not per m).';

/**
 * The same cell constant, once it is one that a cell of the trade can have.
 *
 * 0.001 <= K <= 100
 *
 * @param cellConstantPerCm cell constant, cm⁻¹
 * @returns cell constant, cm⁻¹
 * @throws OutOfDomainError outside 0.001 to 100 cm⁻¹: a length in cm, or a value per m
 * Accuracy: exact.
 * Source: bench-practice.
 * @example requireCellConstant(1.01166) // 1.01166
 */
export function requireCellConstant(cellConstantPerCm: number): number {
  return requireWithin('cell constant', cellConstantPerCm, 'cm⁻¹', LOWEST_PER_CM, HIGHEST_PER_CM, SWAPPED);
}

/**
 * Cell constant from the conductance measured in a solution of known conductivity.
 *
 * K = (kappa_ref + kappa_solvent)/G;  1/G = 1/G_measured - R_lead
 *
 * @param options.referenceUsCm conductivity of the solution at its temperature, µS/cm, above 0
 * @param options.conductanceUs measured conductance, µS, above 0
 * @param options.leadResistanceOhm resistance of the leads in series with the cell, ohm, 0 unless given
 * @param options.solventUsCm conductivity of the water when referenceUsCm leaves it out (as the molal table does), µS/cm, 0 unless given
 * @returns cell constant, cm⁻¹
 * @throws OutOfDomainError for values outside these ranges, leads as large as the whole resistance, or a result outside 0.001 to 100 cm⁻¹
 * Accuracy: exact; that of the solution and of the conductance.
 * Source: definition of the cell constant.
 * @example cellConstant({ referenceUsCm: 1408.23, conductanceUs: 1392.0 }) // ≈ 1.01166
 * @example cellConstant({ referenceUsCm: 12824.6, conductanceUs: 1e6 / 78.4, leadResistanceOhm: 0.5 }) // ≈ 0.99904
 */
export function cellConstant(options: {
  referenceUsCm: number;
  conductanceUs: number;
  leadResistanceOhm?: number;
  solventUsCm?: number;
}): number {
  const { leadResistanceOhm = 0, solventUsCm = 0 } = options;
  const reference = requirePositive('reference conductivity', options.referenceUsCm, 'µS/cm');
  const conductance = requirePositive('conductance', options.conductanceUs, 'µS');
  requireNonNegative('lead resistance', leadResistanceOhm, 'Ω');
  requireNonNegative('conductivity of the water', solventUsCm, 'µS/cm');
  const totalOhm = 1e6 / conductance;
  if (leadResistanceOhm >= totalOhm) {
    throw new OutOfDomainError({
      quantity: 'lead resistance',
      value: leadResistanceOhm,
      unit: 'Ω',
      lower: 0,
      upper: totalOhm,
      advice: 'The leads cannot resist more than cell and leads together.',
    });
  }
  const cellOhm = totalOhm - leadResistanceOhm;
  return requireCellConstant(((reference + solventUsCm) * cellOhm) / 1e6);
}

/** Fouling, a wrong solution and a wrong range move an indication further than any cell constant ever drifts. */
const LARGEST_ADJUSTMENT = constant(0.5, 'relative', 'bench-practice').value;

/**
 * The cell constant that makes an instrument indicate the reference value.
 *
 * K' = K kappa_ref/kappa_indicated
 *
 * @param options.cellConstantPerCm K in use, cm⁻¹, 0.001 to 100
 * @param options.referenceUsCm conductivity of the solution at its temperature, µS/cm, above 0
 * @param options.indicatedUsCm what the instrument indicated with K, raw, µS/cm, above 0
 * @returns adjusted cell constant, cm⁻¹
 * @throws OutOfDomainError outside these ranges, RefusedModelError when indication and reference differ by more than 50 %
 * Accuracy: exact when the indication is proportional to K; a zero offset or polarisation is not undone by it.
 * Source: definition of the cell constant.
 * @example adjustedCellConstant({ cellConstantPerCm: 1, referenceUsCm: 1408.23, indicatedUsCm: 1392 }) // ≈ 1.01166
 */
export function adjustedCellConstant(options: {
  cellConstantPerCm: number;
  referenceUsCm: number;
  indicatedUsCm: number;
}): number {
  const inUse = requireCellConstant(options.cellConstantPerCm);
  const reference = requirePositive('reference conductivity', options.referenceUsCm, 'µS/cm');
  const indicated = requirePositive('indicated conductivity', options.indicatedUsCm, 'µS/cm');
  const ratio = reference / indicated;
  if (Math.abs(ratio - 1) > LARGEST_ADJUSTMENT) {
    throw new RefusedModelError({
      model: 'Adjusting the cell constant',
      reason: `the indication (${indicated} µS/cm) and the reference (${reference} µS/cm) differ by more than 50 %`,
      advice: 'Check the solution in the cell, the range and the wiring first.',
    });
  }
  return requireCellConstant(inUse * ratio);
}

const LOWEST_FACTOR = constant(0.5, '', 'bench-practice').value;
const HIGHEST_FACTOR = constant(1.5, '', 'bench-practice').value;

/**
 * Installation factor of an inductive probe: how the wall of its pipe or vessel changes the field through its hole.
 *
 * f = kappa(true)/kappa(indicated in place with the factory cell constant)
 *
 * @param options.referenceUsCm conductivity of the liquid in place, by a reference probe or a solution, µS/cm, above 0
 * @param options.indicatedUsCm indication in place with factor 1, µS/cm, above 0
 * @returns factor, a pure number: above 1 in a narrow insulating pipe, below 1 in a metal one
 * @throws OutOfDomainError when it is not between 0.5 and 1.5: the probe is mounted too near to a wall, or the liquids differ
 * Accuracy: exact; that of the two conductivities, at one temperature.
 * Source: bench-practice.
 * @example inductiveInstallationFactor({ referenceUsCm: 50000, indicatedUsCm: 47619 }) // ≈ 1.05
 */
export function inductiveInstallationFactor(options: {
  referenceUsCm: number;
  indicatedUsCm: number;
}): number {
  const reference = requirePositive('reference conductivity', options.referenceUsCm, 'µS/cm');
  const indicated = requirePositive('indicated conductivity', options.indicatedUsCm, 'µS/cm');
  const advice =
    'Mount the probe further from the wall, or check that both values belong to the same liquid.';
  return requireWithin(
    'installation factor',
    reference / indicated,
    '',
    LOWEST_FACTOR,
    HIGHEST_FACTOR,
    advice,
  );
}

/**
 * What an inductive probe must indicate with a wire loop and a known resistor through its hole.
 *
 * kappa = K f n²/R
 *
 * @param options.cellConstantPerCm K, cm⁻¹, 0.001 to 100
 * @param options.loopResistanceOhm R of the loop, resistor and wire together, ohm, above 0
 * @param options.installationFactor f set in the instrument, 0.5 to 1.5, 1 unless given
 * @param options.turns n, whole number of passes through the hole, 1 unless given
 * @returns indicated conductivity, µS/cm
 * @throws OutOfDomainError outside these ranges
 * Accuracy: exact; that of the resistor. It checks the electronics and coils, not the liquid path.
 * Source: transformer law; bench-practice.
 * @example expectedLoopConductivity({ cellConstantPerCm: 2.5, loopResistanceOhm: 100 }) // ≈ 25000
 */
export function expectedLoopConductivity(options: {
  cellConstantPerCm: number;
  loopResistanceOhm: number;
  installationFactor?: number;
  turns?: number;
}): number {
  const { installationFactor = 1, turns = 1 } = options;
  const perCm = requireCellConstant(options.cellConstantPerCm);
  const ohm = requirePositive('loop resistance', options.loopResistanceOhm, 'Ω');
  requireWithin('installation factor', installationFactor, '', LOWEST_FACTOR, HIGHEST_FACTOR);
  requireCount('number of turns', turns, 1);
  return (perCm * installationFactor * turns ** 2 * 1e6) / ohm;
}

/**
 * Error of an inductive probe in a loop check.
 *
 * e = 100 (indicated/expected - 1)
 *
 * @param options as expectedLoopConductivity, with options.indicatedUsCm, µS/cm, 0 or more
 * @returns expected conductivity in µS/cm and error in % of it
 * @throws OutOfDomainError outside these ranges
 * Accuracy: that of the resistor.
 * Source: bench-practice.
 * @example loopCheck({ cellConstantPerCm: 2.5, loopResistanceOhm: 100, indicatedUsCm: 25100 }).errorPercent // ≈ 0.4
 */
export function loopCheck(options: {
  cellConstantPerCm: number;
  loopResistanceOhm: number;
  installationFactor?: number;
  turns?: number;
  indicatedUsCm: number;
}): { expectedUsCm: number; errorPercent: number } {
  const indicated = requireNonNegative('indicated conductivity', options.indicatedUsCm, 'µS/cm');
  const expectedUsCm = expectedLoopConductivity(options);
  return { expectedUsCm, errorPercent: 100 * (indicated / expectedUsCm - 1) };
}

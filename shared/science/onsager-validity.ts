/** How far the limiting law of conductance may be trusted, salt by salt. */
import { saltComposition } from './electrolytes.ts';
import type { Salt } from './electrolytes.ts';
import { OutOfDomainError, RefusedModelError, requireWithin } from './errors.ts';
import { constant } from './references.ts';

/** Equivalents per litre to which the law may be used, and beyond which it is refused, from its distance to measured tables. */
const USE_TO = constant(1e-3, 'equivalent/L', 'crc-equivalent-conductivity').value;
const REFUSE_ABOVE = constant(5e-3, 'equivalent/L', 'crc-equivalent-conductivity').value;
/** Largest distance to the measured tables per equivalent/L: 1:1 (LiCl, 0.12 % at 1e-3) and 2:1 or 1:2 (MgCl2, 0.27 % at 1e-3). */
const BIAS_PER_EQUIVALENT_1_1 = constant(
  1.2,
  'relative per equivalent/L',
  'crc-equivalent-conductivity',
).value;
const BIAS_PER_EQUIVALENT_2_1 = constant(
  2.7,
  'relative per equivalent/L',
  'crc-equivalent-conductivity',
).value;

export type OnsagerValidity = 'valid' | 'doubtful' | 'refused';

/**
 * Whether the limiting law may be used here, and how far from the truth it may be.
 *
 * |Lambda(law)/Lambda(measured) - 1| <= s c_eq, s = 1.2 L/equivalent (1:1) or 2.7 L/equivalent (2:1, 1:2)
 *
 * @param options.salt formula, one of `salts`
 * @param options.concentrationMolL concentration, mol/L, 0 or more
 * @returns validity (valid to 1e-3, doubtful to 5e-3 equivalents/L, refused above and for every 2:2 salt), and the
 *   model's relative standard uncertainty (half-width s c_eq, rectangular; a pure number)
 * @throws OutOfDomainError for a negative concentration
 * Accuracy: the bound holds for KCl, NaCl, HCl, LiCl, CaCl2, MgCl2, Na2SO4 to 0.01 equivalents/L.
 * Source: the law against crc-equivalent-conductivity.
 * @example onsagerValidity({ salt: 'KCl', concentrationMolL: 0.002 }).validity // "doubtful"
 */
export function onsagerValidity(options: { salt: Salt; concentrationMolL: number }): {
  validity: OnsagerValidity;
  relativeStandardUncertainty: number;
} {
  const composition = saltComposition(options.salt);
  requireWithin('concentration', options.concentrationMolL, 'mol/L', 0, 20);
  const equivalents = options.concentrationMolL * composition.equivalentsPerMole;
  const highestCharge = Math.max(composition.cationCharge, composition.anionCharge);
  const slope = highestCharge === 1 ? BIAS_PER_EQUIVALENT_1_1 : BIAS_PER_EQUIVALENT_2_1;
  const relativeStandardUncertainty = (slope * equivalents) / Math.sqrt(3);
  const isTwoTwo = composition.cationCharge > 1 && composition.anionCharge > 1;
  if (isTwoTwo || exceeds(equivalents, REFUSE_ABOVE))
    return { validity: 'refused', relativeStandardUncertainty };
  return { validity: exceeds(equivalents, USE_TO) ? 'doubtful' : 'valid', relativeStandardUncertainty };
}

/** A limit met exactly counts as met, whatever the last bit of a product of equivalents says. */
const exceeds = (value: number, limit: number): boolean => value > limit * (1 + 1e-12);

/**
 * Refuses the limiting law where onsagerValidity says so, with the reason and the limit in the message.
 *
 * @param salt formula, one of `salts`
 * @param concentrationMolL concentration, mol/L
 * @throws OutOfDomainError above 5e-3 equivalents/L, RefusedModelError for a 2:2 salt
 * Source: the law against crc-equivalent-conductivity.
 * @example refuseBeyondValidity('KCl', 0.001) // undefined
 */
export function refuseBeyondValidity(salt: Salt, concentrationMolL: number): void {
  if (onsagerValidity({ salt, concentrationMolL }).validity !== 'refused') return;
  const { cationCharge, anionCharge, equivalentsPerMole } = saltComposition(salt);
  if (cationCharge > 1 && anionCharge > 1) {
    throw new RefusedModelError({
      model: 'The limiting law',
      reason: `${salt} pairs its ions, which the law does not know (it is wrong by 3 % already at 0.0005 equivalents/L)`,
      advice: 'Use measured values.',
    });
  }
  throw new OutOfDomainError({
    quantity: `concentration of ${salt} for the limiting law`,
    value: concentrationMolL,
    unit: 'mol/L',
    lower: 0,
    upper: REFUSE_ABOVE / equivalentsPerMole,
    advice: 'Use an extended equation (KCl at 25 °C: to 0.04 mol/L) or measured values.',
  });
}

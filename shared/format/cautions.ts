/**
 * Safety cautions by hazard tag, shown before the step that needs them. They are short on purpose and never carry
 * the authority of a permit: the site's rules prevail.
 */
import type { HazardTag } from '../contracts/vocabulary.ts';

export interface Caution {
  label: string;
  text: string;
}

export const HAZARD_CAUTIONS: Readonly<Record<HazardTag, Caution>> = {
  chemicals: {
    label: 'chemicals',
    text: 'Protect eyes, face and hands, ventilate, add acid to water, rinse fully before return. Read the safety data sheet; never pour a solution back; dispose of waste by the local rule.',
  },
  hypochlorite: {
    label: 'hypochlorite on site',
    text: 'Never use cleaning acid with hypochlorite: chlorine gas forms.',
  },
  'hot-process': {
    label: 'hot process',
    text: 'The medium may be hot, caustic, acid or biological. Isolate, drain and cool first; expect splashes, hot condensate and steam.',
  },
  pressurised: {
    label: 'pressurised',
    text: 'Isolate, depressurise and verify zero. A retractable fitting can eject: never stand in line with it.',
  },
  electrical: {
    label: 'electrical',
    text: 'Isolate, or confirm extra-low voltage; lock out by the site’s rule. Never disconnect live in an explosive atmosphere; a phone not approved for the zone stays outside.',
  },
  'confined-space': {
    label: 'confined space',
    text: 'No entry without a permit, a gas test and an attendant. Reading a value is no reason to enter.',
  },
  'control-loop': {
    label: 'control follows this signal',
    text: 'Valves, dosing or interlocks follow this signal. Tell the operators, hold the output, agree the bypass and who removes it.',
  },
  hygiene: {
    label: 'hygiene zone',
    text: 'Keep the product clean: hygiene zone rules, new gasket, sanitise again by the local procedure, no glass where it is banned.',
  },
  biosecurity: {
    label: 'biosecurity',
    text: 'Disinfect probe and boots between ponds. What is left of the disinfectant harms the stock: rinse.',
  },
};

/** Stands under every set of cautions. */
export const SITE_RULES_FIRST =
  'Site rules, permits, local codes and qualified people come first. Saltmark records a permit number and never replaces a permit.';

/** Stands on records and in the foot of the product. */
export const LIMITS_OF_USE =
  'Saltmark supports but does not replace accredited calibration or licensed practice.';

/**
 * Plain words for every code that people meet, once, for the screen, the record and mail.
 * The keys are the wire codes; a code that is not listed is shown with its hyphens opened.
 */

/** Outcome of a comparison by its guard band [JCGM 106; ILAC-G8:09/2019]. */
export const OUTCOME_LABELS = {
  'within-clear': 'within, clear',
  'within-unsure': 'within, too close to be sure',
  'outside-unsure': 'outside, too close to be sure',
  'outside-clear': 'outside, clear',
} as const;
export type OutcomeCode = keyof typeof OUTCOME_LABELS;

/** Trust of a live reading. */
export const TRUST_LABELS = {
  fit: 'fit',
  care: 'use with care',
  stop: 'do not use',
  gone: 'no signal',
  'use-with-care': 'use with care',
  'do-not-use': 'do not use',
  'no-signal': 'no signal',
} as const;

export const ROLE_LABELS = {
  technician: 'field technician',
  manager: 'instrument manager',
  operator: 'operator',
  auditor: 'auditor',
  administrator: 'administrator',
} as const;

/** What each role comes to do, in one line. */
export const ROLE_TASKS = {
  technician: 'runs calibrations and checks beside the probe',
  manager: 'plans, reviews and approves; sets tolerances, rules and intervals',
  operator: 'watches live readings, responds to alarms, holds a point for maintenance',
  auditor: 'reads and exports history; changes nothing',
  administrator: 'people, sites, devices and mail; approves no results',
} as const;

export const PROBE_KIND_LABELS = {
  'two-electrode': 'two-electrode',
  'four-electrode': 'four-electrode',
  inductive: 'inductive',
} as const;

/** Decision rules: the short name and the sentence that must stand beside an outcome. */
export const DECISION_RULE_LABELS = {
  simple: 'simple acceptance, no guard band',
  'guarded-u': 'guard band equal to U',
  'guarded-0.83u': 'guard band of 0.83 U',
} as const;

export const DECISION_RULE_SENTENCES = {
  simple: 'Within when the error is no larger than the tolerance. U is reported and not used to decide.',
  'guarded-u': 'Within, clear when the error is no larger than the tolerance less U.',
  'guarded-0.83u': 'Within, clear when the error is no larger than the tolerance less 0.83 U.',
} as const;

/** At which stage of a visit a result was taken. */
export const STAGE_LABELS = {
  'as-found': 'as found',
  'as-found-uncleaned': 'as found',
  cleaned: 'as found (cleaned)',
  'as-found-cleaned': 'as found (cleaned)',
  'as-left': 'as left',
  check: 'check',
  automatic: 'automatic check',
} as const;

export const CONTEXT_LABELS = {
  process: 'in the process',
  check: 'in a check solution',
  calibration: 'being calibrated',
  maintenance: 'in maintenance',
  unknown: 'not stated',
} as const;

export const ALERT_LEVEL_LABELS = {
  'respond-now': 'respond now',
  'this-shift': 'this shift',
  plan: 'plan',
  'for-information': 'for information',
} as const;

export const LOT_STATE_LABELS = {
  received: 'received, not yet released',
  released: 'released for use',
  quarantined: 'in quarantine',
  recalled: 'recalled',
  expired: 'past its use-by date',
  'used-up': 'used up',
} as const;

/** Why a device message was set aside instead of being used. */
export const QUARANTINE_LABELS = {
  malformed: 'not valid JSON or not in the agreed form',
  'wrong-device': 'published under another device’s topic',
  'unknown-device': 'from a device that is not registered',
  'unknown-version': 'in a payload version this server does not know',
  'unknown-topic': 'on a topic that means nothing here',
  'too-large': 'larger than 64 kB',
  future: 'dated more than two minutes in the future',
  'out-of-range': 'a value outside what the probe can measure',
  'content-conflict': 'the same reading number arrived again with other content',
} as const;

/** Cautions by hazard tag: shown before the step that needs them. Site rules and the permit prevail. */
export const HAZARD_CAUTIONS = {
  'chemical-reference': {
    label: 'reference solutions',
    caution:
      'Potassium chloride is of low hazard; propanol and water standards burn and dilute acid irritates. Read the safety data sheet, never pour back, dispose of waste by the local rule.',
  },
  'chemical-cleaning': {
    label: 'cleaning chemicals',
    caution:
      'Never use cleaning acid with hypochlorite: chlorine gas forms. Protect eyes, face and hands, ventilate, add acid to water, rinse fully before return.',
  },
  'process-medium': {
    label: 'process medium',
    caution:
      'The medium may be caustic, acid, hot, pressurised or biological. Expect splashes and wash-down.',
  },
  'hot-pressure': {
    label: 'hot or pressurised',
    caution:
      'Isolate, depressurise, drain, cool and verify zero. A retractable fitting can eject: never stand in line with it.',
  },
  electrical: {
    label: 'electrical',
    caution:
      'Isolate, or confirm that the supply is extra-low voltage. Lock out by the site’s rule. Never disconnect live in an explosive atmosphere; a phone that is not approved for the zone stays outside.',
  },
  'explosive-zone': {
    label: 'explosive atmosphere',
    caution:
      'Zone: phone not allowed. Print the steps and record by hand, or use a device approved for the zone.',
  },
  'confined-space': {
    label: 'confined space',
    caution: 'No entry without a permit, a gas test and an attendant. Reading a value is no reason to enter.',
  },
  'working-alone': {
    label: 'alone, at height or near water',
    caution:
      'Agree a partner or a time to check in. Wear a life-jacket near water and stay behind guard rails.',
  },
  'control-action': {
    label: 'control follows this signal',
    caution:
      'Valves, dosing or interlocks follow this signal. Tell the operators, hold the output, agree the bypass and who removes it.',
  },
  hygiene: {
    label: 'hygiene zone',
    caution:
      'Keep the product clean: hygiene zone rules, new gasket, sanitise again by the local procedure, no glass where it is banned.',
  },
  biosecurity: {
    label: 'biosecurity',
    caution:
      'Disinfect probe and boots between ponds. What is left of the disinfectant harms the stock: rinse.',
  },
} as const;

/** Stands under every set of cautions. */
export const SITE_RULES_FIRST =
  'Site rules, permits, local codes and qualified people come first. Saltmark records a permit number and never replaces a permit.';

/** Stands on records and in the foot of the product. */
export const LIMITS_OF_USE =
  'Saltmark supports but does not replace accredited calibration or licensed practice.';

/** Audit actions as a sentence continues after the name of the person. */
export const AUDIT_ACTION_LABELS = {
  create: 'created',
  update: 'changed',
  delete: 'removed',
  install: 'installed',
  move: 'moved',
  retire: 'retired',
  release: 'released',
  quarantine: 'put in quarantine',
  recall: 'recalled',
  approve: 'approved',
  'issue-credentials': 'issued device credentials for',
  'revoke-credentials': 'withdrew device credentials of',
  'sign-in': 'signed in',
  'sign-in-failed': 'failed to sign in',
  'sign-out': 'signed out',
  'sign-out-everywhere': 'signed out everywhere',
  'account-locked': 'was locked out for a time',
  'change-password': 'changed the password',
  'grant-rights': 'gave rights to',
  'withdraw-rights': 'withdrew rights from',
  'change-settings': 'changed settings',
} as const;

/** The words for a code: from the table, or the code itself with hyphens and dots opened. */
export function labelOf(table: Readonly<Record<string, string>>, code: string | null | undefined): string {
  if (!code) return '–';
  return table[code] ?? code.replace(/[-_.]/g, ' ');
}

/** First letter upper case, for a label that begins a sentence. */
export function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** A list in a sentence: `a`, `a and b`, `a, b and c`. */
export function listInWords(items: readonly string[]): string {
  if (items.length < 2) return items[0] ?? '';
  return `${items.slice(0, -1).join(', ')} and ${items.at(-1) ?? ''}`;
}

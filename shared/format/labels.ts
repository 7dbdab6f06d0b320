/**
 * Plain words for every code that people meet, once, for the screen, the record and mail.
 * The tables are typed by the vocabulary, so a code without words does not compile.
 */
import type {
  CellConstantOrigin,
  CheckInvalidReason,
  CheckStage,
  CompensationModelName,
  Criticality,
  DecisionRule,
  DeviceCompensation,
  DisplayUnit,
  IntervalMethod,
  NoticeKind,
  Outcome,
  ProbeEventKind,
  ProbeKind,
  ProbeStatus,
  QuarantineCode,
  ReadingContext,
  ReadingFlag,
  ReadingQuality,
  Role,
  StandardBasis,
  StandardMedium,
  StandardState,
  TemperatureSensor,
  TrustLevel,
  TrustReason,
} from '../contracts/vocabulary.ts';

type Words<Code extends string> = Readonly<Record<Code, string>>;

/** Outcome of a comparison by its guard band [JCGM 106; ILAC-G8:09/2019]. */
export const OUTCOME_LABELS: Words<Outcome> = {
  'within-clear': 'within, clear',
  'within-unsure': 'within, too close to be sure',
  'outside-unsure': 'outside, too close to be sure',
  'outside-clear': 'outside, clear',
};

/** Trust of a live reading; on screen always with its reason. */
export const TRUST_LABELS: Words<TrustLevel> = {
  fit: 'fit',
  'use-with-care': 'use with care',
  'do-not-use': 'do not use',
  'no-signal': 'no signal',
};

/** The bare reason; where figures are known the server's sentence says more. */
export const TRUST_REASON_LABELS: Words<TrustReason> = {
  'no-probe': 'no probe is installed here',
  'no-device': 'the probe has no device that could report',
  'never-heard': 'the device has never sent a reading',
  silent: 'silent for longer than its interval allows',
  held: 'held for maintenance',
  'quality-bad': 'the device itself calls the reading bad',
  'temperature-failed': 'the temperature sensor has failed',
  'not-in-process': 'the probe is not in the process',
  'cell-constant-changed': 'the cell constant changed and no record asked for it',
  'outside-clear': 'the last comparison was outside, clear',
  'outside-unsure': 'the last comparison was outside, too close to be sure',
  'within-unsure': 'the last comparison was within, too close to be sure',
  'check-overdue': 'the next comparison is overdue',
  'never-compared': 'never compared with a reference solution',
  'value-unknown': 'the value at the reference temperature is unknown',
  'quality-doubtful': 'the device itself calls the reading doubtful',
  'clock-doubtful': 'the device clock is doubtful',
  'as-compared': 'as last compared with a reference solution',
};

export const ROLE_LABELS: Words<Role> = {
  technician: 'field technician',
  manager: 'instrument manager',
  operator: 'operator',
  auditor: 'auditor',
  administrator: 'administrator',
};

/** What each role comes to do, in one line. */
export const ROLE_TASKS: Words<Role> = {
  technician: 'runs calibrations and checks beside the probe',
  manager: 'plans, reviews and approves; sets tolerances, rules and intervals',
  operator: 'watches live readings, responds to alarms, holds a point for maintenance',
  auditor: 'reads and exports history; changes nothing',
  administrator: 'looks after people, sites, devices and mail; approves no results',
};

export const PROBE_KIND_LABELS: Words<ProbeKind> = {
  'two-electrode': 'two-electrode',
  'four-electrode': 'four-electrode',
  inductive: 'inductive',
};

export const PROBE_STATUS_LABELS: Words<ProbeStatus> = {
  'in-service': 'in service',
  spare: 'spare',
  quarantined: 'in quarantine',
  retired: 'retired',
};

export const TEMPERATURE_SENSOR_LABELS: Words<TemperatureSensor> = {
  pt100: 'Pt100',
  pt1000: 'Pt1000',
  ntc: 'NTC thermistor',
  other: 'other',
};

/** What the transmitter's own display does. */
export const DEVICE_COMPENSATION_LABELS: Words<DeviceCompensation> = {
  none: 'none',
  linear: 'linear',
  'natural-water': 'natural water',
  unknown: 'not known',
};

/** How a raw reading is taken to the reference temperature. */
export const COMPENSATION_LABELS: Words<CompensationModelName> = {
  none: 'none: the value stays at its own temperature',
  linear: 'linear, with the point’s coefficient',
  'natural-water': 'natural water',
  ultrapure: 'ultrapure water',
};

/** Decision rules: the short name. */
export const DECISION_RULE_LABELS: Words<DecisionRule> = {
  simple: 'simple acceptance, no guard band',
  'guarded-u': 'guard band equal to U',
  'guarded-0.83u': 'guard band of 0.83 U',
};

/** The sentence that must stand beside an outcome. */
export const DECISION_RULE_SENTENCES: Words<DecisionRule> = {
  simple: 'Within when the error is no larger than the tolerance. U is reported and not used to decide.',
  'guarded-u': 'Within, clear when the error is no larger than the tolerance less U.',
  'guarded-0.83u': 'Within, clear when the error is no larger than the tolerance less 0.83 U.',
};

export const INTERVAL_METHOD_LABELS: Words<IntervalMethod> = {
  fixed: 'fixed interval',
  staircase: 'staircase: shorter after a failure, longer after a good result',
  'control-chart': 'control chart',
  'in-use-time': 'hours in use',
  reliability: 'reliability of the group',
};

export const CRITICALITY_LABELS: Words<Criticality> = {
  low: 'low',
  medium: 'medium',
  high: 'high',
  critical: 'critical',
};

/** Units as printed; the wire spells them in ASCII. */
export const DISPLAY_UNIT_LABELS: Readonly<Record<DisplayUnit, 'µS/cm' | 'mS/cm'>> = {
  'uS/cm': 'µS/cm',
  'mS/cm': 'mS/cm',
};

export const STANDARD_MEDIUM_LABELS: Words<StandardMedium> = {
  'kcl-aqueous': 'potassium chloride in water',
  other: 'other',
};

export const STANDARD_BASIS_LABELS: Words<StandardBasis> = {
  molal: 'molal, mol/kg',
  demal: 'demal, D',
  molar: 'molar, mol/L',
  other: 'by certificate only',
};

export const STANDARD_STATE_LABELS: Words<StandardState> = {
  released: 'released for use',
  quarantined: 'in quarantine',
  recalled: 'recalled',
};

/** At which stage of a visit a result was taken. */
export const STAGE_LABELS: Words<CheckStage> = {
  automatic: 'automatic check',
  'as-found': 'as found',
  'as-found-cleaned': 'as found (cleaned)',
  'as-left': 'as left',
};

export const CHECK_INVALID_LABELS: Words<CheckInvalidReason> = {
  'solution-missing': 'the device named no reference solution',
  'solution-unknown': 'no lot with this code is registered',
  'solution-expired': 'the lot was past its use-by date',
  'solution-quarantined': 'the lot is in quarantine',
  'solution-recalled': 'the lot is recalled',
  'not-installed': 'the probe was not installed at a point',
  'no-cell-constant': 'no cell constant is known for the probe',
  'no-temperature': 'no usable temperature came with the reading',
  'no-conductivity': 'no usable conductivity came with the reading',
  'quality-not-good': 'the device itself did not call the reading good',
  'outside-solution-range': 'the temperature is outside what the lot’s certificate covers',
};

export const CONTEXT_LABELS: Words<ReadingContext> = {
  process: 'in the process',
  check: 'in a check solution',
  calibration: 'being calibrated',
  maintenance: 'in maintenance',
  unknown: 'not stated',
};

export const QUALITY_LABELS: Words<ReadingQuality> = { good: 'good', doubtful: 'doubtful', bad: 'bad' };

export const FLAG_LABELS: Words<ReadingFlag> = {
  t_open: 'temperature sensor open',
  t_short: 'temperature sensor shorted',
  over: 'above the range',
  under: 'below the range',
  hold: 'output held',
  simulated: 'simulated value',
  warmup: 'warming up',
  dry: 'probe dry',
};

export type AlertLevel = 'respond-now' | 'this-shift' | 'plan' | 'for-information';

export const ALERT_LEVEL_LABELS: Words<AlertLevel> = {
  'respond-now': 'respond now',
  'this-shift': 'this shift',
  plan: 'plan',
  'for-information': 'for information',
};

/** Why a device message was set aside instead of being used. */
export const QUARANTINE_LABELS: Words<QuarantineCode> = {
  'topic-unknown': 'on a topic that means nothing here',
  'device-unknown': 'from a device that is not registered',
  'device-wrong': 'published under another device’s topic',
  'too-large': 'larger than 64 kB',
  'not-json': 'not valid JSON',
  'version-unknown': 'in a payload version this server does not know',
  'schema-invalid': 'not in the agreed form',
  'time-in-future': 'dated more than two minutes in the future',
  'time-too-old': 'dated before anything is kept',
};

export const NOTICE_LABELS: Words<NoticeKind> = {
  'reading-content-differs': 'the same reading number arrived again with other content',
  'cell-constant-without-record': 'the cell constant in the transmitter changed and no record asked for it',
  'device-replaced': 'another device reports for this probe',
};

export const PROBE_EVENT_LABELS: Words<ProbeEventKind> = {
  registered: 'registered',
  installed: 'installed',
  moved: 'moved',
  removed: 'taken out',
  cleaned: 'cleaned',
  adjusted: 'adjusted',
  'settings-changed': 'settings changed',
  retired: 'retired',
  'credentials-issued': 'device credentials issued',
  'credentials-revoked': 'device credentials withdrawn',
  note: 'note',
  fault: 'fault reported',
};

export const CELL_CONSTANT_ORIGIN_LABELS: Words<CellConstantOrigin> = {
  registered: 'as registered',
  calibration: 'from a calibration',
  'device-reported': 'as the device reported it',
};

/** Audit actions as a sentence continues after the name of the person; unlisted ones are opened by `labelOf`. */
export const AUDIT_ACTION_LABELS: Readonly<Record<string, string>> = {
  create: 'created',
  created: 'created',
  update: 'changed',
  updated: 'changed',
  changed: 'changed',
  register: 'registered',
  install: 'installed',
  move: 'moved',
  remove: 'took out',
  retire: 'retired',
  hold: 'held',
  release: 'released',
  quarantine: 'put in quarantine',
  recall: 'recalled',
  approve: 'approved',
  'issue-credentials': 'issued device credentials',
  'revoke-credentials': 'withdrew device credentials',
  'sign-in': 'signed in',
  'sign-in-failed': 'failed to sign in',
  'sign-out': 'signed out',
  'sign-out-everywhere': 'signed out everywhere',
  lock: 'was locked out for a time',
  'change-password': 'changed the password',
  grant: 'gave a role',
  'end-grant': 'ended a role',
  export: 'exported',
};

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

/**
 * The closed lists of the trade, spelled once. Database constraints, wire schemas, policies and
 * screens all read them here; the plain words for people stand in shared/format/labels.ts.
 */
export const roles = ['technician', 'manager', 'operator', 'auditor', 'administrator'] as const;
export type Role = (typeof roles)[number];

export const probeKinds = ['two-electrode', 'four-electrode', 'inductive'] as const;
export type ProbeKind = (typeof probeKinds)[number];

export const probeStatuses = ['in-service', 'spare', 'quarantined', 'retired'] as const;
export type ProbeStatus = (typeof probeStatuses)[number];

export const temperatureSensors = ['pt100', 'pt1000', 'ntc', 'other'] as const;
export type TemperatureSensor = (typeof temperatureSensors)[number];

/** What the transmitter itself does to the value it shows locally; readings on the wire are always raw. */
export const deviceCompensations = ['none', 'linear', 'natural-water', 'unknown'] as const;
export type DeviceCompensation = (typeof deviceCompensations)[number];

export const compensationModels = ['none', 'linear', 'natural-water', 'ultrapure'] as const;
export type CompensationModelName = (typeof compensationModels)[number];

export const decisionRules = ['simple', 'guarded-u', 'guarded-0.83u'] as const;
export type DecisionRule = (typeof decisionRules)[number];

export const outcomes = ['within-clear', 'within-unsure', 'outside-unsure', 'outside-clear'] as const;
export type Outcome = (typeof outcomes)[number];

export const intervalMethods = ['fixed', 'staircase', 'control-chart', 'in-use-time', 'reliability'] as const;
export type IntervalMethod = (typeof intervalMethods)[number];

export const criticalities = ['low', 'medium', 'high', 'critical'] as const;
export type Criticality = (typeof criticalities)[number];

export const displayUnits = ['uS/cm', 'mS/cm'] as const;
export type DisplayUnit = (typeof displayUnits)[number];

/** Each tag has its short caution in shared/format/labels.ts. */
export const hazardTags = [
  'chemicals',
  'hypochlorite',
  'hot-process',
  'pressurised',
  'electrical',
  'confined-space',
  'control-loop',
  'hygiene',
  'biosecurity',
] as const;
export type HazardTag = (typeof hazardTags)[number];

export const standardMedia = ['kcl-aqueous', 'other'] as const;
export type StandardMedium = (typeof standardMedia)[number];

export const standardBases = ['molal', 'demal', 'molar', 'other'] as const;
export type StandardBasis = (typeof standardBases)[number];

export const standardStates = ['released', 'quarantined', 'recalled'] as const;
export type StandardState = (typeof standardStates)[number];

export const readingContexts = ['process', 'check', 'calibration', 'maintenance', 'unknown'] as const;
export type ReadingContext = (typeof readingContexts)[number];

export const readingQualities = ['good', 'doubtful', 'bad'] as const;
export type ReadingQuality = (typeof readingQualities)[number];

export const readingFlags = [
  't_open',
  't_short',
  'over',
  'under',
  'hold',
  'simulated',
  'warmup',
  'dry',
] as const;
export type ReadingFlag = (typeof readingFlags)[number];

/** In what state of the probe a KCl comparison was made. */
export const checkStages = ['automatic', 'as-found', 'as-found-cleaned', 'as-left'] as const;
export type CheckStage = (typeof checkStages)[number];

/** Why a comparison counts for nothing. It is kept and shown, never used. */
export const checkInvalidReasons = [
  'solution-missing',
  'solution-unknown',
  'solution-expired',
  'solution-quarantined',
  'solution-recalled',
  'not-installed',
  'no-cell-constant',
  'no-temperature',
  'no-conductivity',
  'quality-not-good',
  'outside-solution-range',
] as const;
export type CheckInvalidReason = (typeof checkInvalidReasons)[number];

/** How far a live reading may be believed. */
export const trustLevels = ['fit', 'use-with-care', 'do-not-use', 'no-signal'] as const;
export type TrustLevel = (typeof trustLevels)[number];

/** The reason behind the trust; never dropped, always shown in words. */
export const trustReasons = [
  'no-probe',
  'no-device',
  'never-heard',
  'silent',
  'held',
  'quality-bad',
  'temperature-failed',
  'not-in-process',
  'cell-constant-changed',
  'outside-clear',
  'outside-unsure',
  'within-unsure',
  'check-overdue',
  'never-compared',
  'value-unknown',
  'quality-doubtful',
  'clock-doubtful',
  'as-compared',
] as const;
export type TrustReason = (typeof trustReasons)[number];

export const quarantineCodes = [
  'topic-unknown',
  'device-unknown',
  'device-wrong',
  'too-large',
  'not-json',
  'version-unknown',
  'schema-invalid',
  'time-in-future',
  'time-too-old',
] as const;
export type QuarantineCode = (typeof quarantineCodes)[number];

export const noticeKinds = [
  'reading-content-differs',
  'cell-constant-without-record',
  'device-replaced',
] as const;
export type NoticeKind = (typeof noticeKinds)[number];

export const probeEventKinds = [
  'registered',
  'installed',
  'moved',
  'removed',
  'cleaned',
  'adjusted',
  'settings-changed',
  'retired',
  'credentials-issued',
  'credentials-revoked',
  'note',
  'fault',
] as const;
export type ProbeEventKind = (typeof probeEventKinds)[number];

export const cellConstantOrigins = ['registered', 'calibration', 'device-reported'] as const;
export type CellConstantOrigin = (typeof cellConstantOrigins)[number];

/** The steps of a run in the order a procedure may name them; a procedure leaves out what does not apply. */
export const runSteps = [
  'identify',
  'pre-checks',
  'hold',
  'as-found-process',
  'as-found',
  'clean',
  'zero-in-air',
  'as-found-cleaned',
  'decide',
  'second-point',
  'temperature-sensor',
  'as-left',
  'reinstall',
  'review',
  'sign',
] as const;
export type RunStep = (typeof runSteps)[number];

/** Steps that are made of captured readings. */
export const captureSteps = [
  'as-found-process',
  'as-found',
  'zero-in-air',
  'as-found-cleaned',
  'second-point',
  'temperature-sensor',
  'as-left',
] as const;
export type CaptureStep = (typeof captureSteps)[number];

export const calibrationStatuses = [
  'running',
  'stopped',
  'signed',
  'returned',
  'approved',
  'amended',
] as const;
export type CalibrationStatus = (typeof calibrationStatuses)[number];

export const captureSources = ['stream', 'typed'] as const;
export type CaptureSource = (typeof captureSources)[number];

/** Why a captured reading does not count; it stays visible, struck through. */
export const exclusionCodes = [
  'bubble',
  'not-immersed',
  'disturbed',
  'wrong-solution',
  'typing-slip',
  'instrument-fault',
] as const;
export type ExclusionCode = (typeof exclusionCodes)[number];

export const signatureMeanings = ['performed', 'approved', 'returned'] as const;
export type SignatureMeaning = (typeof signatureMeanings)[number];

export const instrumentKinds = ['meter', 'thermometer', 'cell', 'resistor-set', 'balance'] as const;
export type InstrumentKind = (typeof instrumentKinds)[number];

export const instrumentStates = ['in-use', 'out-of-use'] as const;
export type InstrumentState = (typeof instrumentStates)[number];

export const commandStates = ['waiting', 'confirmed', 'failed'] as const;
export type CommandState = (typeof commandStates)[number];

export const promptKinds = ['due-soon', 'overdue'] as const;
export type PromptKind = (typeof promptKinds)[number];

/** Slices that live updates speak of; one name each for URL, table, folder and query key. */
export const slices = [
  'sites',
  'areas',
  'points',
  'probes',
  'devices',
  'standards',
  'readings',
  'checks',
  'quarantine',
  'notices',
  'users',
  'memberships',
  'sessions',
  'audit-events',
  'settings',
  'mails',
  'procedures',
  'calibrations',
  'bottles',
  'instruments',
  'certificates',
  'prompts',
] as const;
export type Slice = (typeof slices)[number];

/** A calibration run: what the person at the probe sends, and what everybody reads. */
import { z } from 'zod';
import { day, id, idParam, instant, listQuery, longText, reason, shortText } from './common.ts';
import { budgetRow } from './checks.ts';
import { criteria } from './procedures.ts';
import {
  calibrationStatuses,
  captureSources,
  captureSteps,
  commandStates,
  decisionRules,
  exclusionCodes,
  hazardTags,
  outcomes,
  probeKinds,
  runSteps,
  signatureMeanings,
} from './vocabulary.ts';

/** Made on the phone, so that the same deed sent twice is done once. */
export const deedKey = z.uuid();

export const startCalibration = z.object({
  key: deedKey,
  probeId: id,
  procedureId: id.optional(),
  standardId: id.describe('lot for as found, cleaned and as left'),
  bottleId: id.nullable().default(null),
  secondStandardId: id.nullable().default(null).describe('independent lot of the second point'),
  thermometerId: id.nullable().default(null),
  override: z
    .object({ byUserId: id, password: z.string().min(1).max(200), reason })
    .nullable()
    .default(null)
    .describe('another person answers for an unusable lot'),
  capturedAt: instant,
});
export type StartCalibration = z.infer<typeof startCalibration>;

/** What each step records beside its captured readings. */
export const stepData = z.discriminatedUnion('step', [
  z.object({
    step: z.literal('identify'),
    by: z.enum(['scan', 'typed']),
    serial: shortText,
    cellConstantPerCm: z.number().positive().nullable().default(null),
  }),
  z.object({
    step: z.literal('pre-checks'),
    permitNumber: z.string().trim().max(60).nullable().default(null),
    cautionsRead: z.literal(true, {
      error: 'Read the cautions first; site rules and permits come before them.',
    }),
    controlRoomTold: z.boolean(),
  }),
  z.object({ step: z.literal('hold'), untilAt: instant }),
  z.object({
    step: z.literal('as-found-process'),
    comparedWith: z.enum(['portable-meter', 'grab-sample', 'nothing']),
    note: longText.nullable().default(null),
  }),
  z.object({ step: z.literal('as-found') }),
  z.object({
    step: z.literal('clean'),
    agent: shortText,
    minutes: z.number().min(0).max(600),
    note: longText.nullable().default(null),
  }),
  z.object({ step: z.literal('zero-in-air') }),
  z.object({ step: z.literal('as-found-cleaned') }),
  z.object({
    step: z.literal('decide'),
    decision: z.enum(['leave', 'adjust']),
    reason: reason.nullable().default(null),
  }),
  z.object({ step: z.literal('second-point') }),
  z.object({ step: z.literal('temperature-sensor') }),
  z.object({ step: z.literal('as-left') }),
  z.object({ step: z.literal('reinstall'), note: longText.nullable().default(null) }),
  z.object({ step: z.literal('review'), note: longText.nullable().default(null) }),
]);
export type StepData = z.infer<typeof stepData>;
export const finishStep = z.object({ key: deedKey, capturedAt: instant, data: stepData });
export type FinishStep = z.infer<typeof finishStep>;

export const captureReading = z.object({
  key: deedKey,
  step: z.enum(captureSteps),
  source: z.enum(captureSources),
  conductivityUsCm: z.number().min(0).max(5_000_000),
  temperatureC: z.number().min(-10).max(140).describe('of the probe'),
  referenceTemperatureC: z.number().min(-10).max(140).nullable().default(null),
  referenceConductivityUsCm: z
    .number()
    .positive()
    .nullable()
    .default(null)
    .describe('portable reference, in process only'),
  /** Of the stream’s reading, when it came from there. */
  boot: z.string().max(40).nullable().default(null),
  n: z.number().int().min(0).nullable().default(null),
  isStable: z.boolean().describe('false = the time-out ran out; that is a result'),
  isConfirmed: z.boolean().default(false).describe('a typed value far from the solution was confirmed'),
  capturedAt: instant,
  clockOffsetMs: z.number().nullable().default(null),
});
export type CaptureReading = z.infer<typeof captureReading>;

export const excludeCapture = z.object({
  key: deedKey,
  code: z.enum(exclusionCodes),
  note: longText.nullable().default(null),
  capturedAt: instant,
});
export type ExcludeCapture = z.infer<typeof excludeCapture>;
export const stopCalibration = z.object({ reason, capturedAt: instant });
export const handOver = z.object({ toUserId: id, reason });
export const signCalibration = z.object({ password: z.string().min(1).max(200), capturedAt: instant });
export const reviewCalibration = z.object({
  decision: z.enum(['approve', 'return']),
  reason: reason.nullable().default(null),
  password: z.string().min(1).max(200),
});
export type ReviewCalibration = z.infer<typeof reviewCalibration>;
export const amendCalibration = z.object({
  aspect: shortText,
  text: longText.min(3),
  reason,
  password: z.string().min(1).max(200),
});
export type AmendCalibration = z.infer<typeof amendCalibration>;

export const capture = z.object({
  id,
  key: deedKey,
  step: z.enum(captureSteps),
  position: z.number().int().min(1),
  source: z.enum(captureSources),
  conductivityUsCm: z.number(),
  temperatureC: z.number(),
  referenceTemperatureC: z.number().nullable(),
  referenceConductivityUsCm: z.number().nullable(),
  isStable: z.boolean(),
  capturedAt: instant,
  receivedAt: instant,
  clockOffsetMs: z.number().nullable(),
  excluded: z
    .object({ code: z.enum(exclusionCodes), note: z.string().nullable(), by: z.string(), at: instant })
    .nullable(),
});
export type Capture = z.infer<typeof capture>;

/** One state of the probe compared with its lot, judged once, on the server. */
export const verdict = z.object({
  lotCode: z.string(),
  replicateCount: z.number().int(),
  meanUsCm: z.number(),
  meanTemperatureC: z.number(),
  repeatabilityPercent: z.number(),
  cellConstantPerCm: z.number(),
  referenceUsCm: z.number(),
  referenceSource: z.string(),
  errorPercent: z.number(),
  expandedUncertaintyPercent: z.number(),
  coverageFactor: z.number(),
  impliedCellConstantPerCm: z.number().nullable(),
  outcome: z.enum(outcomes),
  probabilityOutside: z.number(),
  acceptanceLimitPercent: z.number(),
  budget: z.array(budgetRow),
});
export type Verdict = z.infer<typeof verdict>;

const change = z.object({
  changePercent: z.number(),
  expandedUncertaintyPercent: z.number(),
  isSignificant: z.boolean(),
});

export const judgement = z.object({
  asFound: verdict.nullable(),
  cleaned: verdict.nullable(),
  asLeft: verdict.nullable(),
  asLeftEqualsCleaned: z.boolean().describe('left as it was: not measured again'),
  secondPoint: verdict.nullable(),
  fouling: change.nullable(),
  driftSinceAsLeft: change.nullable(),
  temperatureErrorC: z.number().nullable(),
  zeroUsCm: z.number().nullable(),
  /** What the guard against over-adjusting says once the cleaned state is known. */
  advice: z
    .object({
      decision: z.enum(['leave', 'adjust', 'replace']),
      sentence: z.string(),
      normalisedError: z.number(),
      proposedCellConstantPerCm: z.number(),
      changePercent: z.number(),
      needsReason: z.boolean(),
    })
    .nullable(),
  secondPointAgrees: z.boolean().nullable(),
});
export type Judgement = z.infer<typeof judgement>;

export const signature = z.object({
  userId: id,
  name: z.string(),
  role: z.string(),
  meaning: z.enum(signatureMeanings),
  statement: z.string(),
  signedAt: instant,
  method: z.string(),
  recordHash: z.string(),
  note: z.string().nullable(),
});
export type Signature = z.infer<typeof signature>;

export const calibrationRow = z.object({
  id,
  number: z.string().nullable(),
  status: z.enum(calibrationStatuses),
  probeId: id,
  probeTag: z.string(),
  probeSerial: z.string(),
  pointId: id,
  pointCode: z.string(),
  pointName: z.string(),
  siteId: id,
  siteName: z.string(),
  lotCode: z.string(),
  performerId: id,
  performer: z.string(),
  startedAt: instant,
  signedAt: instant.nullable(),
  approvedAt: instant.nullable(),
  dueOn: day.nullable(),
  asFoundErrorPercent: z.number().nullable(),
  cleanedErrorPercent: z.number().nullable(),
  asLeftErrorPercent: z.number().nullable(),
  outcome: z.enum(outcomes).nullable().describe('of the state found, cleaned'),
  isAdjusted: z.boolean(),
});
export type CalibrationRow = z.infer<typeof calibrationRow>;

export const calibration = calibrationRow.extend({
  key: deedKey,
  probeKind: z.enum(probeKinds),
  procedure: z.object({ id, code: z.string(), name: z.string(), version: z.number().int(), criteria }),
  hazardTags: z.array(z.enum(hazardTags)),
  controlNote: z.string().nullable(),
  displayUnit: z.string(),
  tolerancePercent: z.number(),
  decisionRule: z.enum(decisionRules),
  cellConstantBeforePerCm: z.number(),
  cellConstantAfterPerCm: z.number().nullable(),
  nominalCellConstantPerCm: z.number(),
  lot: z.object({ id, code: z.string(), label: z.string(), bottleCode: z.string().nullable() }),
  secondLot: z.object({ id, code: z.string(), label: z.string() }).nullable(),
  thermometer: z.object({ id, code: z.string(), expandedUncertaintyC: z.number(), dueOn: day }).nullable(),
  override: z.object({ by: z.string(), reason: z.string() }).nullable(),
  /** "Can this lot and thermometer decide this tolerance?", as planned at the start. */
  plan: z.object({ canDecide: z.boolean(), expandedUncertaintyPercent: z.number(), sentence: z.string() }),
  steps: z.array(
    z.object({
      step: z.enum(runSteps),
      state: z.enum(['done', 'current', 'waiting']),
      capturedAt: instant.nullable(),
      receivedAt: instant.nullable(),
      by: z.string().nullable(),
      data: z.unknown(),
    }),
  ),
  currentStep: z.enum(runSteps).nullable(),
  captures: z.array(capture),
  /** Verdicts of finished steps only: the expected value never stands on a screen before its capture. */
  judgement,
  command: z
    .object({
      state: z.enum(commandStates),
      cellConstantPerCm: z.number(),
      requestedAt: instant,
      answeredAt: instant.nullable(),
      detail: z.string().nullable(),
    })
    .nullable(),
  signatures: z.array(signature),
  recordHash: z.string().nullable(),
  stoppedReason: z.string().nullable(),
  amends: z.object({ id, number: z.string() }).nullable(),
  amendedBy: z.object({ id, number: z.string() }).nullable(),
  can: z.object({
    continue: z.boolean(),
    stop: z.boolean(),
    handOver: z.boolean(),
    sign: z.boolean(),
    approve: z.boolean(),
    return: z.boolean(),
    amend: z.boolean(),
    sendAgain: z.boolean().describe('the device has not confirmed the cell constant: order it once more'),
  }),
});
export type Calibration = z.infer<typeof calibration>;

export const capturePath = z.object({ id: idParam, captureId: idParam });

/** A signed record: SHA-256 of the canonical form (RFC 8785) of `record` is `recordHash`. */
export const calibrationRecord = z.object({
  number: z.string(),
  status: z.enum(calibrationStatuses),
  record: z.record(z.string(), z.unknown()),
  canonicalForm: z.literal('RFC 8785'),
  hashAlgorithm: z.literal('SHA-256'),
  recordHash: z.string(),
  signatures: z.array(signature),
  dueOn: day.nullable(),
  amends: z.string().nullable(),
  amendedBy: z.string().nullable(),
});
export type CalibrationRecord = z.infer<typeof calibrationRecord>;

export const calibrationsQuery = listQuery.extend({
  siteId: idParam.optional(),
  pointId: idParam.optional(),
  probeId: idParam.optional(),
  standardId: idParam.optional(),
  performerId: idParam.optional(),
  status: z.enum(calibrationStatuses).optional(),
  outcome: z.enum(outcomes).optional(),
  from: day.optional(),
  to: day.optional(),
});
export type CalibrationsQuery = z.infer<typeof calibrationsQuery>;

export type { Prompt } from './prompts.ts';

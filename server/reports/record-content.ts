/** The signed record as a report reads it. The JSON is the record; nothing here is computed again. */
import type { Judgement, Verdict } from '../../shared/contracts/calibrations.ts';
import type { Signature } from '../../shared/contracts/calibrations.ts';
import type {
  CalibrationStatus,
  CaptureSource,
  CaptureStep,
  DecisionRule,
  ExclusionCode,
  ProbeKind,
  RunStep,
} from '../../shared/contracts/vocabulary.ts';

interface CertificateFile {
  sha256: string;
  fileName: string;
}

export interface RecordLot {
  code: string;
  producer: string;
  product: string;
  nominal: number | null;
  basis: string;
  certifiedConductivityUsCm: number | null;
  referenceTemperatureC: number;
  expandedUncertaintyUsCm: number | null;
  coverageFactor: number | null;
  traceability: string;
  isInHouse: boolean;
  issuedOn: string;
  expiresOn: string;
  state: string;
  certificate: CertificateFile | null;
}

export interface RecordInstrument {
  code: string;
  name: string;
  serial: string;
  certificateNumber: string;
  issuedOn: string;
  dueOn: string;
  expandedUncertaintyC: number;
  coverageFactor: number;
  correctionC: number;
  traceability: string;
  certificate: CertificateFile | null;
}

export interface RecordCapture {
  step: CaptureStep;
  position: number;
  source: CaptureSource;
  conductivityUsCm: number;
  temperatureC: number;
  referenceTemperatureC: number | null;
  referenceConductivityUsCm: number | null;
  isStable: boolean;
  capturedAt: string;
  receivedAt: string;
  clockOffsetMs: number | null;
  excluded: { code: ExclusionCode; note: string | null; by: string | null; at: string } | null;
}

interface RecordHead {
  number: string;
  organisation: string;
  site: { code: string; name: string; timeZone: string };
  point: { code: string; name: string; area: string; duty?: string; medium?: string };
  probe: { serial: string; tag: string; kind: ProbeKind; nominalCellConstantPerCm: number };
  signedAt: string;
  judgement: Judgement;
  cellConstantBeforePerCm: number;
  cellConstantAfterPerCm: number | null;
  remark: string;
}

export interface CalibrationContent extends RecordHead {
  kind: 'calibration record';
  procedure: { code: string; version: number; name: string; steps: RunStep[] };
  requirement: { tolerancePercent: number; decisionRule: DecisionRule };
  traceability: {
    lot: RecordLot;
    bottle: { code: string; openedAt: string | null; useByOn: string | null; remainingMl: number } | null;
    secondLot: RecordLot | null;
    thermometer: RecordInstrument | null;
  };
  plan: { canDecide: boolean; expandedUncertaintyPercent: number; sentence: string };
  override: { by: string; reason: string } | null;
  permitNumber: string | null;
  startedAt: string;
  performer: { id: number; name: string };
  steps: {
    step: RunStep;
    data: Record<string, unknown>;
    capturedAt: string;
    receivedAt: string;
    by: string | null;
  }[];
  captures: RecordCapture[];
}

export interface AmendmentContent extends RecordHead {
  kind: 'amendment';
  amends: { number: string; recordHash: string };
  aspect: string;
  text: string;
  reason: string;
  author: { id: number; name: string };
}

export type RecordContent = CalibrationContent | AmendmentContent;

/** A signed record with what stands around it: who signed, and whether it has been amended. */
export interface SignedRecord {
  record: RecordContent;
  recordHash: string;
  status: CalibrationStatus;
  signatures: readonly Signature[];
  amends: string | null;
  amendedBy: string | null;
  tolerancePercent: number;
  /** Of the earlier visits, newest first: the track of the drift on the strip. */
  earlierErrors: readonly number[];
  /** Printed only where the site has agreed to it [ISO/IEC 17025, 7.8.4.3]. */
  dueOn: string | null;
}

export const recordFormats = ['saltmark-calibration-record/1'] as const;

/** The stored JSON as content; a format of another time is refused instead of being misread. */
export function readRecordContent(json: Record<string, unknown>): RecordContent {
  if (!(recordFormats as readonly unknown[]).includes(json['format']))
    throw new TypeError(`Record format ${String(json['format'])} is not known to this version.`);
  return json as unknown as RecordContent;
}

export interface LastState {
  verdict: Verdict;
  what: 'As left' | 'As found, cleaned' | 'As found';
}

/** The state the probe was left in, as far as the run came. */
export function lastState({ asFound, cleaned, asLeft }: Judgement): LastState | null {
  if (asLeft) return { verdict: asLeft, what: 'As left' };
  if (cleaned) return { verdict: cleaned, what: 'As found, cleaned' };
  return asFound && { verdict: asFound, what: 'As found' };
}

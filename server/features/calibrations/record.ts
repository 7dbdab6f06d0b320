/** Pure: the calibration record as it is signed. Everything a reader needs to repeat the conclusion stands in it. */
import type { Capture, CalibrationStep, Instrument, Standard } from '../../db/models/index.ts';
import type { Run } from './runs.ts';

/** Of the shape below; a reader refuses what it does not know. */
export const recordFormat = 'saltmark-calibration-record/1';

export interface RecordFacts {
  number: string;
  signedAt: Date;
  organisation: string;
  /** Certificate files by id. */
  certificates: ReadonlyMap<number, { sha256: string; fileName: string }>;
}

const instant = (at: Date): string => at.toISOString();

export function buildRecord(run: Run, facts: RecordFacts): Record<string, unknown> {
  const { row } = run;
  return {
    format: recordFormat,
    kind: 'calibration record',
    number: facts.number,
    organisation: facts.organisation,
    site: { code: row.site.code, name: row.site.name, timeZone: row.site.timeZone },
    point: {
      code: row.point.code,
      name: row.point.name,
      area: run.areaName,
      duty: row.point.duty,
      medium: row.point.medium,
    },
    probe: probeOf(run),
    procedure: {
      code: row.procedure.code,
      version: row.procedure.version,
      name: row.procedure.name,
      steps: row.procedure.steps,
      criteria: row.procedure.criteria,
    },
    requirement: { tolerancePercent: row.tolerancePercent, decisionRule: row.decisionRule },
    traceability: traceabilityOf(run, facts),
    plan: row.plan,
    override: row.override,
    permitNumber: row.permitNumber,
    startedAt: instant(row.startedAt),
    signedAt: instant(facts.signedAt),
    performer: { id: row.performerId, name: row.performer.name },
    steps: run.steps.map(stepOf),
    captures: run.captures.map(captureOf),
    cellConstantBeforePerCm: row.cellConstantBeforePerCm,
    cellConstantAfterPerCm: row.cellConstantAfterPerCm,
    judgement: row.judgement,
    remark:
      'Results relate only to the probe named above. In-house calibration, traceable through the lot named above.',
  };
}

const probeOf = ({ row: { probe } }: Run) => ({
  serial: probe.serial,
  tag: probe.tag,
  kind: probe.kind,
  nominalCellConstantPerCm: probe.nominalCellConstantPerCm,
  resolutionUsCm: probe.resolutionUsCm,
  temperatureSensor: probe.temperatureSensor,
});

function traceabilityOf({ row }: Run, facts: RecordFacts) {
  return {
    lot: lotOf(row.standard, facts),
    bottle: row.bottle
      ? {
          code: row.bottle.code,
          openedAt: row.bottle.openedAt && instant(row.bottle.openedAt),
          useByOn: row.bottle.useByOn,
          remainingMl: row.bottle.remainingMl,
        }
      : null,
    secondLot: row.secondStandard ? lotOf(row.secondStandard, facts) : null,
    thermometer: row.thermometer ? instrumentOf(row.thermometer, facts) : null,
  };
}

const certificateOf = (id: number | null, { certificates }: RecordFacts) =>
  (id !== null && certificates.get(id)) || null;

const lotOf = (lot: Standard, facts: RecordFacts) => ({
  code: lot.code,
  producer: lot.producer,
  product: lot.product,
  medium: lot.medium,
  basis: lot.basis,
  nominal: lot.nominal,
  certifiedConductivityUsCm: lot.certifiedConductivityUsCm,
  referenceTemperatureC: lot.referenceTemperatureC,
  expandedUncertaintyUsCm: lot.expandedUncertaintyUsCm,
  coverageFactor: lot.coverageFactor,
  temperatureTable: lot.temperatureTable,
  traceability: lot.traceability,
  isInHouse: lot.isInHouse,
  issuedOn: lot.issuedOn,
  expiresOn: lot.expiresOn,
  state: lot.state,
  certificate: certificateOf(lot.certificateId, facts),
});

const instrumentOf = (instrument: Instrument, facts: RecordFacts) => ({
  code: instrument.code,
  name: instrument.name,
  serial: instrument.serial,
  certificateNumber: instrument.certificateNumber,
  issuedOn: instrument.issuedOn,
  dueOn: instrument.dueOn,
  expandedUncertaintyC: instrument.expandedUncertainty,
  coverageFactor: instrument.coverageFactor,
  correctionC: instrument.correction,
  traceability: instrument.traceability,
  certificate: certificateOf(instrument.certificateId, facts),
});

const stepOf = (step: CalibrationStep) => ({
  step: step.step,
  data: step.data,
  capturedAt: instant(step.capturedAt),
  receivedAt: instant(step.receivedAt),
  by: step.user?.name ?? null,
});

const captureOf = (capture: Capture) => ({
  key: capture.key,
  step: capture.step,
  position: capture.position,
  source: capture.source,
  conductivityUsCm: capture.conductivityUsCm,
  temperatureC: capture.temperatureC,
  referenceTemperatureC: capture.referenceTemperatureC,
  referenceConductivityUsCm: capture.referenceConductivityUsCm,
  cellConstantPerCm: capture.cellConstantPerCm,
  isStable: capture.isStable,
  isConfirmed: capture.isConfirmed,
  boot: capture.boot,
  n: capture.n,
  capturedAt: instant(capture.capturedAt),
  receivedAt: instant(capture.receivedAt),
  clockOffsetMs: capture.clockOffsetMs,
  excluded: capture.exclusion
    ? {
        code: capture.exclusion.code,
        note: capture.exclusion.note,
        by: capture.exclusion.user?.name ?? null,
        at: instant(capture.exclusion.at),
      }
    : null,
});

export function buildAmendment(
  run: Run,
  facts: RecordFacts,
  said: { aspect: string; text: string; reason: string; by: { id: number; name: string } },
): Record<string, unknown> {
  const { row } = run;
  return {
    format: recordFormat,
    kind: 'amendment',
    number: facts.number,
    organisation: facts.organisation,
    amends: { number: row.number, recordHash: row.recordHash },
    site: { code: row.site.code, name: row.site.name, timeZone: row.site.timeZone },
    point: { code: row.point.code, name: row.point.name, area: run.areaName },
    probe: probeOf(run),
    aspect: said.aspect,
    text: said.text,
    reason: said.reason,
    author: said.by,
    signedAt: instant(facts.signedAt),
    judgement: row.judgement,
    cellConstantBeforePerCm: row.cellConstantBeforePerCm,
    cellConstantAfterPerCm: row.cellConstantAfterPerCm,
    remark: 'The record named above stays as it was signed; this amendment is read with it.',
  };
}

/** A signed record with everything on it that can stand on one: an excluded replicate, a second point, an adjustment, a hash. */
import type { Judgement, Signature } from '../../shared/contracts/calibrations.ts';
import type { CaptureStep, RunStep } from '../../shared/contracts/vocabulary.ts';
import type { CertifiedLot } from '../../shared/science/certified-lots.ts';
import { lotReferenceConductivity } from '../../shared/science/certified-lots.ts';
import { judgeRun } from '../../server/features/calibrations/judge.ts';
import { canonicalJson, sha256Hex } from '../../server/lib/hashing.ts';
import type { CalibrationContent, RecordCapture, SignedRecord } from '../../server/reports/record-content.ts';

const lot: CertifiedLot = {
  medium: 'kcl-aqueous',
  basis: 'molal',
  nominal: 0.01,
  certifiedConductivityUsCm: 1408.2,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: 3.52,
  coverageFactor: 2,
  temperatureTable: null,
};
const secondLot: CertifiedLot = {
  ...lot,
  nominal: 0.1,
  certifiedConductivityUsCm: 12_825,
  expandedUncertaintyUsCm: 32,
};

export const recordCriteria = {
  minReplicates: 3,
  stabilityWindowS: 60,
  stabilityRangePercent: 0.3,
  stabilitySlopePercentPerMin: 0.1,
  temperatureRangeC: 0.1,
  stabilityTimeoutS: 600,
  repeatabilityLimitPercent: 0.3,
  adjustmentShareOfTolerance: 2 / 3,
  openBeakerLimitUsCm: 50,
};

const startedMs = Date.parse('2026-12-01T13:05:00Z');
const at = (minutes: number): string => new Date(startedMs + minutes * 60_000).toISOString();

/** Readings of a probe that shows `errorPercent` too much at 13 °C, with a scatter of a few hundredths of a percent. */
function captures(
  step: CaptureStep,
  liquid: CertifiedLot,
  errorPercent: number,
  fromMinute: number,
): RecordCapture[] {
  return [0, 0.04, -0.03, 0.02].map((scatter, index) => {
    const temperatureC = 13.02 + index * 0.004;
    const reference = lotReferenceConductivity({ lot: liquid, temperatureC }).conductivityUsCm;
    return {
      step,
      position: index + 1,
      source: 'stream',
      conductivityUsCm: reference * (1 + (errorPercent + scatter) / 100),
      temperatureC,
      referenceTemperatureC: temperatureC,
      referenceConductivityUsCm: null,
      isStable: true,
      capturedAt: at(fromMinute + index),
      receivedAt: at(fromMinute + index + (step === 'as-found' ? 20 : 0)),
      clockOffsetMs: step === 'as-found' ? 400 : null,
      excluded: null,
    };
  });
}

const allSteps: RunStep[] = [
  'identify',
  'pre-checks',
  'hold',
  'as-found',
  'clean',
  'as-found-cleaned',
  'decide',
];
const lateSteps: RunStep[] = ['second-point', 'as-left', 'reinstall', 'review', 'sign'];

function judgementOf(readings: readonly RecordCapture[], afterPerCm: number): Judgement {
  return judgeRun({
    kind: 'two-electrode',
    resolutionUsCm: 0.1,
    nominalCellConstantPerCm: 0.5,
    tolerancePercent: 2,
    rule: 'guarded-u',
    criteria: recordCriteria,
    thermometer: { standardUncertaintyC: 0.015, correctionC: 0 },
    probeTemperatureStandardUncertaintyC: 0.05,
    solution: { code: 'KC-26-031', lot, isOpened: true },
    secondSolution: { code: 'KC-26-050', lot: secondLot, isOpened: true },
    readings: readings
      .filter((one) => one.excluded === null)
      .map((one) => ({ ...one, cellConstantPerCm: one.step === 'as-left' ? afterPerCm : 0.5012 })),
    finished: new Set([...allSteps, ...lateSteps]),
    decision: 'adjust',
    cellConstantAfterPerCm: afterPerCm,
    lastVisit: null,
  });
}

const lotContent = (code: string, liquid: CertifiedLot) => ({
  code,
  producer: 'Brinefold Reference Solutions',
  product: `Potassium chloride ${liquid.nominal} mol/kg`,
  medium: liquid.medium,
  nominal: liquid.nominal,
  basis: liquid.basis,
  certifiedConductivityUsCm: liquid.certifiedConductivityUsCm,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: liquid.expandedUncertaintyUsCm,
  coverageFactor: 2,
  temperatureTable: null,
  traceability: 'Traceable to the SI through the producer’s primary cell.',
  isInHouse: false,
  issuedOn: '2026-05-04',
  expiresOn: '2027-06-30',
  state: 'released',
  certificate: { sha256: 'ab'.repeat(32), fileName: '7741-B.pdf' },
});

export function recordContent(more: Partial<CalibrationContent> = {}): CalibrationContent {
  const afterPerCm = 0.5098;
  const found = captures('as-found', lot, -2.3, 12);
  found[1]!.excluded = { code: 'bubble', note: 'tapped off', by: 'Ines Falk', at: at(14) };
  const readings = [
    ...found,
    ...captures('as-found-cleaned', lot, -1.72, 30),
    ...captures('second-point', secondLot, -1.66, 44),
    ...captures('as-left', lot, 0.0, 52),
  ];
  return {
    kind: 'calibration record',
    number: 'SP-2026-0418',
    organisation: 'Corrie Sound Utilities',
    site: { code: 'SP', name: 'Skerry Point desalination', timeZone: 'Europe/London' },
    point: {
      code: 'SK-21',
      name: 'After lime',
      area: 'Remineralisation',
      duty: 'dosing',
      medium: 'limed permeate',
    },
    probe: { serial: '2E-1183', tag: 'sk-21-a', kind: 'two-electrode', nominalCellConstantPerCm: 0.5 },
    procedure: {
      code: 'in-line-probe',
      version: 1,
      name: 'Probe with electrodes, beside its measuring point',
      steps: [...allSteps, ...lateSteps],
    },
    requirement: { tolerancePercent: 2, decisionRule: 'guarded-u' },
    traceability: {
      lot: lotContent('KC-26-031', lot),
      bottle: {
        code: 'KC-26-031/07',
        openedAt: '2026-11-24T09:00:00Z',
        useByOn: '2027-01-23',
        remainingMl: 260,
      },
      secondLot: lotContent('KC-26-050', secondLot),
      thermometer: {
        code: 'RT-05',
        name: 'Reference thermometer',
        serial: 'TH-5521',
        certificateNumber: 'T-118',
        issuedOn: '2026-05-12',
        dueOn: '2027-05-12',
        expandedUncertaintyC: 0.03,
        coverageFactor: 2,
        correctionC: 0,
        traceability: 'Traceable to the SI.',
        certificate: null,
      },
    },
    plan: {
      canDecide: true,
      expandedUncertaintyPercent: 0.8,
      sentence: 'This lot and thermometer can decide this tolerance: U 0.80 % against 2 %.',
    },
    override: null,
    permitNumber: 'W-1187',
    startedAt: at(0),
    signedAt: at(66.6),
    performer: { id: 1, name: 'Ines Falk' },
    steps: [...allSteps, ...lateSteps].map((step, index) => ({
      step,
      data: step === 'clean' ? { step, agent: 'Detergent and soft brush', minutes: 5 } : { step },
      capturedAt: at(index * 5),
      receivedAt: at(index * 5 + 0.1),
      by: 'Ines Falk',
    })),
    captures: readings,
    judgement: judgementOf(readings, afterPerCm),
    cellConstantBeforePerCm: 0.5012,
    cellConstantAfterPerCm: afterPerCm,
    remark:
      'Results relate only to the probe named above. In-house calibration, traceable through the lot named above.',
    ...more,
  };
}

export function signedRecord(more: Partial<SignedRecord> = {}): SignedRecord {
  const record = more.record ?? recordContent();
  const recordHash = sha256Hex(canonicalJson(record as unknown as Record<string, unknown>));
  const sign = (one: Partial<Signature>): Signature => ({
    userId: 1,
    name: 'Ines Falk',
    role: 'field technician',
    meaning: 'performed',
    statement: 'I performed this work as recorded.',
    signedAt: '2026-12-01T14:11:36Z',
    method: 'signed in, password entered again at signing',
    recordHash,
    note: null,
    ...one,
  });
  return {
    recordHash,
    status: 'approved',
    signatures: [
      sign({}),
      sign({
        userId: 2,
        name: 'Tomas Reik',
        role: 'instrument manager',
        meaning: 'approved',
        statement: 'Reviewed and approved for use.',
        signedAt: '2026-12-01T15:02:10Z',
      }),
    ],
    amends: null,
    amendedBy: null,
    tolerancePercent: 2,
    earlierErrors: [-0.7, -0.2, 0],
    dueOn: null,
    ...more,
    record,
  };
}

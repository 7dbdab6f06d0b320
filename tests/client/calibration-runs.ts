import type { Calibration, Capture } from '../../shared/contracts/calibrations.ts';
import type { RunStep } from '../../shared/contracts/vocabulary.ts';
import type { Deed } from '../../client/src/features/calibrations/offline/deeds.ts';

export const START = '2026-12-01T13:05:00.000Z';
export const at = (seconds: number): string => new Date(Date.parse(START) + seconds * 1000).toISOString();

const ORDER: RunStep[] = [
  'identify',
  'pre-checks',
  'hold',
  'as-found',
  'clean',
  'as-found-cleaned',
  'decide',
  'as-left',
  'reinstall',
  'review',
  'sign',
];

/** A run of one probe as the server tells it, at a step; earlier steps are done. */
export function aRun(current: RunStep, captures: Capture[] = []): Calibration {
  const place = ORDER.indexOf(current);
  return {
    id: 7,
    key: '7c0e7c9c-2f1f-4f0d-9d0a-2f0c6a1d0007',
    number: null,
    status: 'running',
    probeId: 10,
    probeTag: 'sk-21',
    probeSerial: '2E-1183',
    probeKind: 'two-electrode',
    pointId: 3,
    pointCode: 'SK-21',
    pointName: 'After lime',
    siteId: 1,
    siteName: 'Skerry Point',
    lotCode: 'KC-26-031',
    performerId: 1,
    performer: 'Ines Falk',
    startedAt: START,
    signedAt: null,
    approvedAt: null,
    dueOn: null,
    asFoundErrorPercent: null,
    cleanedErrorPercent: null,
    asLeftErrorPercent: null,
    outcome: null,
    isAdjusted: false,
    procedure: {
      id: 1,
      code: 'in-line-probe',
      name: 'Probe with electrodes',
      version: 1,
      criteria: {
        minReplicates: 3,
        stabilityWindowS: 60,
        stabilityRangePercent: 0.3,
        stabilitySlopePercentPerMin: 0.1,
        temperatureRangeC: 0.1,
        stabilityTimeoutS: 600,
        repeatabilityLimitPercent: 0.3,
        adjustmentShareOfTolerance: 0.67,
        openBeakerLimitUsCm: 50,
      },
    },
    hazardTags: [],
    controlNote: null,
    displayUnit: 'uS/cm',
    tolerancePercent: 2,
    decisionRule: 'guarded-u',
    cellConstantBeforePerCm: 0.5193,
    cellConstantAfterPerCm: null,
    nominalCellConstantPerCm: 0.5,
    lot: { id: 5, code: 'KC-26-031', label: 'KCl 0.01 mol/kg', bottleCode: 'KC-26-031/07' },
    secondLot: null,
    thermometer: null,
    override: null,
    plan: { canDecide: true, expandedUncertaintyPercent: 0.8, sentence: 'It can decide.' },
    steps: ORDER.map((step, i) => ({
      step,
      state: i < place ? 'done' : i === place ? 'current' : 'waiting',
      capturedAt: i < place ? at(60 * i) : null,
      receivedAt: i < place ? at(60 * i + 1) : null,
      by: i < place ? 'Ines Falk' : null,
      data: null,
    })),
    currentStep: current,
    captures,
    judgement: {
      asFound: null,
      cleaned: null,
      asLeft: null,
      asLeftEqualsCleaned: false,
      secondPoint: null,
      fouling: null,
      driftSinceAsLeft: null,
      temperatureErrorC: null,
      zeroUsCm: null,
      advice: null,
      secondPointAgrees: null,
    },
    command: null,
    signatures: [],
    recordHash: null,
    stoppedReason: null,
    amends: null,
    amendedBy: null,
    can: {
      continue: true,
      stop: true,
      handOver: true,
      sign: false,
      approve: false,
      return: false,
      amend: false,
      sendAgain: false,
    },
  };
}

export function aCapture(key: string, position: number, conductivityUsCm = 1078.4): Capture {
  return {
    id: 100 + position,
    key,
    step: 'as-found',
    position,
    source: 'stream',
    conductivityUsCm,
    temperatureC: 13.02,
    referenceTemperatureC: null,
    referenceConductivityUsCm: null,
    isStable: true,
    capturedAt: at(300 + 10 * position),
    receivedAt: at(301 + 10 * position),
    clockOffsetMs: 400,
    excluded: null,
  };
}

/** A reading captured on the phone. */
export function aCaptureDeed(key: string, conductivityUsCm = 1078.9, calibrationId = 7): Deed {
  return {
    kind: 'capture',
    calibrationId,
    body: {
      key,
      step: 'as-found',
      source: 'stream',
      conductivityUsCm,
      temperatureC: 13.03,
      referenceTemperatureC: null,
      referenceConductivityUsCm: null,
      boot: 'boot0001',
      n: 4711,
      isStable: true,
      isConfirmed: false,
      capturedAt: at(400),
      clockOffsetMs: 400,
    },
  };
}

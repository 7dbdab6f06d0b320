import type { ReferenceSolution } from '../bench.ts';
import type { ProbeProfile } from '../probe.ts';
import type { LotSeed, PointSeed, ProbeSeed } from './types.ts';

const DAYS_PER_MONTH = 30.436875;

const noiseOf = {
  'two-electrode': { relative: 4e-4, absoluteUsCm: 0.004 },
  'four-electrode': { relative: 5e-4, absoluteUsCm: 0.3 },
  inductive: { relative: 6e-4, absoluteUsCm: 2 },
} as const;

/** Time constant of the temperature sensor in stirred liquid: a bare sheath is quick, a moulded ring slow. */
const responseOf = { 'two-electrode': 14, 'four-electrode': 18, inductive: 75 } as const;

/** Moulded rings sit in fittings with walls near by; the factor was found and set at commissioning to within this. */
const installationOf = { 'two-electrode': 1, 'four-electrode': 1, inductive: 1.004 } as const;

export function solutionOf(lot: LotSeed): ReferenceSolution {
  return {
    code: lot.code,
    basis: lot.basis,
    nominal: lot.nominal,
    certified25UsCm: lot.certifiedUsCm,
    table: lot.temperatureTable,
    deviation: lot.deviation,
  };
}

function deviceCompensation(point: PointSeed | null): ProbeProfile['compensation'] {
  if (!point || point.compensation.model === 'none' || point.compensation.model === 'ultrapure') {
    return { model: 'none', coefficientPercentPerK: null, referenceC: null };
  }
  const { model, coefficientPerK, referenceC } = point.compensation;
  const percent = coefficientPerK === null ? null : Math.round(coefficientPerK * 1e5) / 1e3;
  return { model, coefficientPercentPerK: percent, referenceC };
}

/** The physical profile of a probe where it stands; `checkLot` is the lot in its flow cell, if it has one. */
export function profileOf(probe: ProbeSeed, point: PointSeed | null, checkLot: LotSeed | null): ProbeProfile {
  return {
    device: probe.device,
    serial: probe.serial,
    kind: probe.kind,
    firmware: probe.firmware,
    newCellConstantPerCm: probe.newCellConstantPerCm,
    rangeLowUsCm: probe.rangeLowUsCm,
    rangeHighUsCm: probe.rangeHighUsCm,
    resolutionUsCm: probe.resolutionUsCm,
    intervalS: 5,
    compensation: deviceCompensation(point),
    water: point?.water ?? 'dairy-mains',
    ageing: {
      perDay: probe.driftPercentPerMonth / 100 / DAYS_PER_MONTH,
      walkPerRootDay: probe.walkPercentPerRootMonth / 100 / Math.sqrt(DAYS_PER_MONTH),
    },
    fouling: {
      perDay: probe.foulingPercentPerMonth / 100 / DAYS_PER_MONTH,
      ceiling: probe.foulingCeilingPercent / 100,
    },
    noise: noiseOf[probe.kind],
    temperature: { offsetC: probe.temperatureOffsetC, noiseC: 0.008, responseS: responseOf[probe.kind] },
    seriesResistanceOhm: 0.05,
    leakageUs: probe.kind === 'inductive' ? 0.1 : 0.002,
    installationFactor: installationOf[probe.kind],
    check:
      checkLot && point?.checkEveryHours
        ? { solution: checkLot.code, everyHours: point.checkEveryHours }
        : null,
  };
}

import type {
  JudgedReading,
  LiveRow,
  Series,
  SeriesPoint,
  Strip,
} from '../../../shared/contracts/readings.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { pointPolicy } from '../points/policy.ts';
import { presentHold } from '../points/presenter.ts';
import { valueAtReference, type JudgedValue, type PointCompensation } from './judge.ts';
import type { BucketRow, ComparisonRow, SeriesRow, StandRow, StandingRow } from './queries.ts';
import type { Verdict } from './verdicts.ts';

/** The tolerance strip draws three earlier errors behind the newest one. */
const earlierShown = 3;

export const stripOf = (
  comparison: Omit<ComparisonRow, 'checkId' | 'probeId' | 'pointId'>,
  earlierErrorPercent: readonly number[],
): Strip => ({
  at: comparison.at.toISOString(),
  stage: comparison.stage,
  errorPercent: comparison.errorPercent,
  expandedUncertaintyPercent: comparison.expandedUncertaintyPercent,
  coverageFactor: comparison.coverageFactor,
  tolerancePercent: comparison.tolerancePercent,
  guardBandPercent: comparison.tolerancePercent - comparison.acceptanceLimitPercent,
  decisionRule: comparison.decisionRule,
  outcome: comparison.outcome,
  probabilityOutside: comparison.probabilityOutside,
  earlierErrorPercent: earlierErrorPercent.slice(0, earlierShown),
});

/** The point's requirements for stating a value; null where no point is. */
export function compensationOfStanding(row: StandingRow): PointCompensation | null {
  const { compensationModel, compensationCoefficientPercentPerK, referenceTemperatureC } = row;
  if (compensationModel === null || referenceTemperatureC === null) return null;
  return { compensationModel, compensationCoefficientPercentPerK, referenceTemperatureC };
}

export const presentReading = (row: StandingRow, value: JudgedValue): JudgedReading | null =>
  row.readingAt === null
    ? null
    : {
        at: row.readingAt.toISOString(),
        receivedAt: row.readingReceivedAt!.toISOString(),
        context: row.readingContext!,
        conductivityUsCm: row.readingConductivityUsCm,
        temperatureC: row.readingTemperatureC,
        ...value,
        quality: row.readingQuality!,
        flags: row.readingFlags ?? [],
      };

export function presentLiveRow(
  row: StandingRow,
  verdict: Verdict,
  trace: readonly BucketRow[],
  actor: Actor,
): LiveRow {
  const compensation = compensationOfStanding(row);
  const isHeld = row.holdUserId !== null;
  return {
    point: {
      id: row.pointId!,
      code: row.pointCode!,
      name: row.pointName!,
      areaId: row.areaId!,
      areaName: row.areaName!,
      siteId: row.siteId,
      siteName: row.siteName,
      displayUnit: row.displayUnit!,
      referenceTemperatureC: row.referenceTemperatureC!,
      compensationModel: row.compensationModel!,
      lowLimitUsCm: row.lowLimitUsCm,
      highLimitUsCm: row.highLimitUsCm,
      criticality: row.criticality!,
      controlNote: row.controlNote,
    },
    probe:
      row.probeId === null
        ? null
        : {
            id: row.probeId,
            tag: row.probeTag!,
            serial: row.probeSerial!,
            kind: row.probeKind!,
            cellConstantPerCm: row.cellConstantPerCm!,
          },
    reading: verdict.reading,
    trust: verdict.trust,
    strip: verdict.strip,
    trace: trace.map((bucket) => [bucket.at.getTime(), valueAtReference(bucket, compensation)]),
    hold: presentHold(row),
    can: {
      hold: !isHeld && may(pointPolicy, 'hold', actor, row.siteId),
      release: isHeld && may(pointPolicy, 'release', actor, row.siteId),
    },
  };
}

export interface SeriesFacts {
  probeId: number;
  from: Date;
  to: Date;
  bucketSeconds: number | null;
  rows: SeriesRow[];
  /** Where the probe stood, oldest first. */
  stands: StandRow[];
}

const isSameBasis = (a: StandRow, b: StandRow): boolean =>
  a.compensationModel === b.compensationModel && a.referenceTemperatureC === b.referenceTemperatureC;

/** One curve has one reference temperature: the newest stand's. Values stated on another basis are left out. */
export function presentSeries(facts: SeriesFacts): Series {
  const newest = facts.stands.at(-1);
  const pointOf = (row: SeriesRow): SeriesPoint => {
    const stand = facts.stands.find(
      ({ fromAt, toAt }) => fromAt <= row.at && (toAt === null || toAt > row.at),
    );
    const isComparable = stand !== undefined && newest !== undefined && isSameBasis(stand, newest);
    return {
      at: row.at.toISOString(),
      conductivityUsCm: row.conductivityUsCm,
      minUsCm: row.minUsCm,
      maxUsCm: row.maxUsCm,
      temperatureC: row.temperatureC,
      valueUsCm: isComparable ? valueAtReference(row, stand) : null,
      count: row.count,
    };
  };
  return {
    probeId: facts.probeId,
    from: facts.from.toISOString(),
    to: facts.to.toISOString(),
    bucketSeconds: facts.bucketSeconds,
    referenceTemperatureC: newest?.referenceTemperatureC ?? null,
    compensationModel: newest?.compensationModel ?? null,
    points: facts.rows.map(pointOf),
  };
}

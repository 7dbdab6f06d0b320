/** One verdict for each probe where it stands: the reading stated, the trust, and the comparison behind both. */
import type { JudgedReading, Strip, Trust } from '../../../shared/contracts/readings.ts';
import type { SettingValue } from '../../../shared/contracts/settings.ts';
import { decide } from '../../../shared/science/decision.ts';
import { judgeReading } from './judge.ts';
import { compensationOfStanding, presentReading, stripOf } from './presenter.ts';
import type { ComparisonRow, StandingRow } from './queries.ts';
import { judgeTrust, type TrustInput } from './trust.ts';

export interface Verdict {
  reading: JudgedReading | null;
  trust: Trust;
  strip: Strip | null;
}

export interface VerdictRules {
  fitness: SettingValue<'check-fitness'>;
  uncertainty: SettingValue<'check-uncertainty'>;
}

/**
 * A comparison against what the point asks for now. It was decided by the requirements of its day; the probe may
 * have moved, or the tolerance changed, since. The record keeps its own outcome.
 */
function againstPoint(comparison: ComparisonRow, row: StandingRow): ComparisonRow {
  const { tolerancePercent, decisionRule } = row;
  if (tolerancePercent === null || decisionRule === null) return comparison;
  if (tolerancePercent === comparison.tolerancePercent && decisionRule === comparison.decisionRule)
    return comparison;
  const decision = decide({
    error: comparison.errorPercent,
    expandedUncertainty: comparison.expandedUncertaintyPercent,
    coverageFactor: comparison.coverageFactor,
    tolerance: tolerancePercent,
    rule: decisionRule,
  });
  return {
    ...comparison,
    tolerancePercent,
    decisionRule,
    outcome: decision.outcome,
    probabilityOutside: decision.probabilityOutside,
    acceptanceLimitPercent: decision.acceptanceLimit,
  };
}

const rawReadingOf = (row: StandingRow) => ({
  conductivityUsCm: row.readingConductivityUsCm,
  temperatureC: row.readingTemperatureC,
});

function trustInputOf(
  row: StandingRow,
  valueUsCm: number | null,
  latest: ComparisonRow | undefined,
  now: Date,
  { fitness }: VerdictRules,
): TrustInput {
  return {
    now,
    // Without a point there is no interval to be late for; the caller says what that means.
    point: { intervalDays: row.intervalDays ?? 365, displayUnit: row.displayUnit ?? 'uS/cm' },
    timeZone: row.timeZone,
    probe: row.cellConstantPerCm === null ? null : { cellConstantPerCm: row.cellConstantPerCm },
    device:
      row.deviceId === null
        ? null
        : {
            isOnline: row.isOnline ?? false,
            reportedCellConstantPerCm: row.reportedCellConstantPerCm,
            readingIntervalS: row.readingIntervalS,
            clockOffsetMs: row.clockOffsetMs,
          },
    reading:
      row.readingAt === null
        ? null
        : {
            at: row.readingAt,
            context: row.readingContext!,
            ...rawReadingOf(row),
            quality: row.readingQuality!,
            flags: row.readingFlags ?? [],
            valueUsCm,
          },
    hold: row.holdUserId === null ? null : { reason: row.holdReason!, untilAt: row.holdUntilAt! },
    lastCheck: latest ?? null,
    calibrationDueOn: row.calibrationDueOn,
    fitness,
  };
}

const notInstalled: Trust = {
  level: 'do-not-use',
  reason: 'not-in-process',
  text: 'not installed at a measuring point',
};

/** `comparisons` are those of the probe that count, newest first. */
export function judgeStanding(
  row: StandingRow,
  comparisons: readonly ComparisonRow[],
  now: Date,
  rules: VerdictRules,
): Verdict {
  const [newest, ...earlier] = comparisons;
  const latest = newest && againstPoint(newest, row);
  const value = judgeReading({
    reading: rawReadingOf(row),
    point: compensationOfStanding(row),
    lastComparison: latest ?? null,
    temperatureStandardUncertaintyC: rules.uncertainty.temperatureStandardUncertaintyC,
  });
  const trust = judgeTrust(trustInputOf(row, value.valueUsCm, latest, now, rules));
  const isIdle = row.pointId === null && trust.level !== 'no-signal';
  return {
    reading: presentReading(row, value),
    trust: isIdle ? notInstalled : trust,
    strip: latest
      ? stripOf(
          latest,
          earlier.map((one) => one.errorPercent),
        )
      : null,
  };
}

import { QueryTypes } from 'sequelize';
import type {
  CheckStage,
  CompensationModelName,
  Criticality,
  DecisionRule,
  DisplayUnit,
  Outcome,
  ProbeKind,
  ReadingContext,
  ReadingFlag,
  ReadingQuality,
} from '../../../shared/contracts/vocabulary.ts';
import type { Parts } from '../../parts.ts';

type Database = Pick<Parts, 'sequelize'>;

/** A probe where it stands, or a point without one: all that a verdict on it needs but the comparisons. */
export interface StandingRow {
  pointId: number | null;
  pointCode: string | null;
  pointName: string | null;
  areaId: number | null;
  areaName: string | null;
  siteId: number;
  siteName: string;
  timeZone: string;
  displayUnit: DisplayUnit | null;
  compensationModel: CompensationModelName | null;
  compensationCoefficientPercentPerK: number | null;
  referenceTemperatureC: number | null;
  lowLimitUsCm: number | null;
  highLimitUsCm: number | null;
  tolerancePercent: number | null;
  decisionRule: DecisionRule | null;
  intervalDays: number | null;
  criticality: Criticality | null;
  controlNote: string | null;
  probeId: number | null;
  probeTag: string | null;
  probeSerial: string | null;
  probeKind: ProbeKind | null;
  cellConstantPerCm: number | null;
  deviceId: number | null;
  isOnline: boolean | null;
  readingIntervalS: number | null;
  clockOffsetMs: number | null;
  reportedCellConstantPerCm: number | null;
  readingAt: Date | null;
  readingReceivedAt: Date | null;
  readingContext: ReadingContext | null;
  readingConductivityUsCm: number | null;
  readingTemperatureC: number | null;
  readingQuality: ReadingQuality | null;
  readingFlags: ReadingFlag[] | null;
  /** Set by the newest calibration in effect, `YYYY-MM-DD`. */
  calibrationDueOn: string | null;
  holdUserId: number | null;
  holdUserName: string | null;
  holdReason: string | null;
  holdFromAt: Date | null;
  holdUntilAt: Date | null;
}

const standingColumns = `
  pt.id as "pointId", pt.code as "pointCode", pt.name as "pointName", a.id as "areaId", a.name as "areaName",
  s.id as "siteId", s.name as "siteName", s.time_zone as "timeZone", pt.display_unit as "displayUnit",
  pt.compensation_model as "compensationModel",
  pt.compensation_coefficient_percent_per_k as "compensationCoefficientPercentPerK",
  pt.reference_temperature_c as "referenceTemperatureC", pt.low_limit_us_cm as "lowLimitUsCm",
  pt.high_limit_us_cm as "highLimitUsCm", pt.tolerance_percent as "tolerancePercent",
  pt.decision_rule as "decisionRule", pt.interval_days as "intervalDays", pt.criticality,
  pt.control_note as "controlNote",
  p.id as "probeId", p.tag as "probeTag", p.serial as "probeSerial", p.kind as "probeKind",
  p.cell_constant_per_cm as "cellConstantPerCm",
  d.id as "deviceId", d.is_online as "isOnline",
  d.reading_interval_s as "readingIntervalS", d.clock_offset_ms as "clockOffsetMs",
  d.reported_cell_constant_per_cm as "reportedCellConstantPerCm",
  r.at as "readingAt", r.received_at as "readingReceivedAt", r.context as "readingContext",
  r.conductivity_us_cm as "readingConductivityUsCm", r.temperature_c as "readingTemperatureC",
  r.quality as "readingQuality", r.flags as "readingFlags",
  k.due_on::text as "calibrationDueOn", h.user_id as "holdUserId", u.name as "holdUserName", h.reason as "holdReason", h.from_at as "holdFromAt",
  h.until_at as "holdUntilAt"`;

const heard = `
  left join devices d on d.probe_id = p.id and d.revoked_at is null
  left join live_readings r on r.probe_id = p.id
  left join holds h on h.point_id = pt.id and h.ended_at is null and h.until_at > $now
  left join users u on u.id = h.user_id
  left join lateral (
    select due_on from calibrations where probe_id = p.id and due_on is not null
    order by started_at desc, id desc limit 1
  ) k on true`;

/** Every point in use of the sites (null = all), with the probe that stands there, by site, area and code. */
export function selectStandingPoints(
  { sequelize }: Database,
  siteIds: number[] | null,
  now: Date,
): Promise<StandingRow[]> {
  return sequelize.query<StandingRow>(
    `select ${standingColumns}
     from points pt
     join areas a on a.id = pt.area_id
     join sites s on s.id = a.site_id
     left join assignments at on at.point_id = pt.id and at.to_at is null
     left join probes p on p.id = at.probe_id
     ${heard}
     where pt.retired_at is null and s.retired_at is null and ($siteIds::int[] is null or s.id = any($siteIds))
     order by lower(s.name), s.id, a.position, a.id, lower(pt.code)`,
    { type: QueryTypes.SELECT, bind: { siteIds, now } },
  );
}

/** The probes asked for, wherever they stand; one that is not installed has no point. */
export function selectStandingProbes(
  { sequelize }: Database,
  probeIds: readonly number[],
  now: Date,
): Promise<StandingRow[]> {
  return sequelize.query<StandingRow>(
    `select ${standingColumns}
     from probes p
     join sites s on s.id = p.site_id
     left join assignments at on at.probe_id = p.id and at.to_at is null
     left join points pt on pt.id = at.point_id
     left join areas a on a.id = pt.area_id
     ${heard}
     where p.id = any($probeIds::int[])`,
    { type: QueryTypes.SELECT, bind: { probeIds, now } },
  );
}

/** A comparison that counts, whole. */
export interface ComparisonRow {
  checkId: number;
  probeId: number;
  pointId: number | null;
  at: Date;
  stage: CheckStage;
  errorPercent: number;
  expandedUncertaintyPercent: number;
  coverageFactor: number;
  tolerancePercent: number;
  acceptanceLimitPercent: number;
  decisionRule: DecisionRule;
  outcome: Outcome;
  probabilityOutside: number;
}

/** The result of comparison `c` without its identity. */
export const resultColumns = `c.stage,
  c.error_percent as "errorPercent", c.expanded_uncertainty_percent as "expandedUncertaintyPercent",
  c.coverage_factor as "coverageFactor", c.tolerance_percent as "tolerancePercent",
  c.acceptance_limit_percent as "acceptanceLimitPercent", c.decision_rule as "decisionRule", c.outcome,
  c.probability_outside as "probabilityOutside"`;

/** The newest comparisons that count, at most `perProbe` each, newest first. */
export function selectComparisons(
  { sequelize }: Database,
  probeIds: readonly number[],
  perProbe: number,
): Promise<ComparisonRow[]> {
  return sequelize.query<ComparisonRow>(
    `select c.* from unnest($probeIds::int[]) as wanted (probe_id)
     cross join lateral (
       select c.id as "checkId", c.probe_id as "probeId", c.point_id as "pointId", c.at, ${resultColumns}
       from checks c
       where c.probe_id = wanted.probe_id and c.is_valid
       order by c.at desc, c.id desc limit $perProbe) c`,
    { type: QueryTypes.SELECT, bind: { probeIds, perProbe } },
  );
}

export interface BucketRow {
  probeId: number;
  at: Date;
  conductivityUsCm: number | null;
  temperatureC: number | null;
}

/** What a trace shows: the probe in its process, or not saying where it is; never in a bottle. */
const inProcess = `context in ('process', 'unknown')`;

/** Mean of each bucket from one moment to another, for several probes at once. */
export function selectTraces(
  { sequelize }: Database,
  probeIds: readonly number[],
  from: Date,
  to: Date,
  bucketSeconds: number,
): Promise<BucketRow[]> {
  return sequelize.query<BucketRow>(
    `select probe_id as "probeId", date_bin($bucketSeconds * interval '1 second', at, timestamptz '2000-01-01T00:00:00Z') as at,
       avg(conductivity_us_cm) as "conductivityUsCm", avg(temperature_c) as "temperatureC"
     from readings
     where probe_id = any($probeIds::int[]) and at >= $from and at <= $to and ${inProcess}
     group by 1, 2 order by 1, 2`,
    { type: QueryTypes.SELECT, bind: { probeIds, from, to, bucketSeconds } },
  );
}

export interface SeriesRow {
  at: Date;
  conductivityUsCm: number | null;
  minUsCm: number | null;
  maxUsCm: number | null;
  temperatureC: number | null;
  count: number;
}

interface Window {
  probeId: number;
  from: Date;
  to: Date;
}

/** Single readings in the window, oldest first; ask for one more than may be shown to know whether they fit. */
export function selectSingleReadings(
  { sequelize }: Database,
  window: Window,
  limit: number,
): Promise<SeriesRow[]> {
  return sequelize.query<SeriesRow>(
    `select at, conductivity_us_cm as "conductivityUsCm", conductivity_us_cm as "minUsCm",
       conductivity_us_cm as "maxUsCm", temperature_c as "temperatureC", 1 as count
     from readings
     where probe_id = $probeId and at >= $from and at < $to and ${inProcess}
     order by at limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...window, limit } },
  );
}

const bucket = (column: string) =>
  `date_bin($bucketSeconds * interval '1 second', ${column}, timestamptz '2000-01-01T00:00:00Z')`;

/** Readings of the window in buckets, straight from the readings. */
export function selectReadingBuckets(
  { sequelize }: Database,
  window: Window,
  bucketSeconds: number,
): Promise<SeriesRow[]> {
  return sequelize.query<SeriesRow>(
    `select ${bucket('at')} as at, avg(conductivity_us_cm) as "conductivityUsCm",
       min(conductivity_us_cm) as "minUsCm", max(conductivity_us_cm) as "maxUsCm",
       avg(temperature_c) as "temperatureC", count(*) as count
     from readings
     where probe_id = $probeId and at >= $from and at < $to and ${inProcess}
     group by 1 order by 1`,
    { type: QueryTypes.SELECT, bind: { ...window, bucketSeconds } },
  );
}

/**
 * The same from the ten-minute summaries, completed from the readings for what is not summarised yet. Means are
 * weighted by the readings behind them.
 */
export function selectRollupBuckets(
  { sequelize }: Database,
  window: Window,
  bucketSeconds: number,
): Promise<SeriesRow[]> {
  return sequelize.query<SeriesRow>(
    `with summarised as (
       select coalesce(max(bucket_at) + interval '10 minutes', $from) as until
       from reading_rollups where probe_id = $probeId and bucket_at >= $from and bucket_at < $to
     ), pieces as (
       select bucket_at as at, reading_count::double precision as n, conductivity_mean_us_cm as mean,
         conductivity_min_us_cm as low, conductivity_max_us_cm as high, temperature_mean_c as t
       from reading_rollups where probe_id = $probeId and bucket_at >= $from and bucket_at < $to
       union all
       select ${bucket('at')}, count(*), avg(conductivity_us_cm), min(conductivity_us_cm), max(conductivity_us_cm),
         avg(temperature_c)
       from readings
       where probe_id = $probeId and at >= greatest($from, (select until from summarised)) and at < $to and ${inProcess}
       group by 1
     )
     select ${bucket('at')} as at,
       sum(mean * n) / nullif(sum(n) filter (where mean is not null), 0) as "conductivityUsCm",
       min(low) as "minUsCm", max(high) as "maxUsCm",
       sum(t * n) / nullif(sum(n) filter (where t is not null), 0) as "temperatureC", sum(n)::bigint as count
     from pieces group by 1 order by 1`,
    { type: QueryTypes.SELECT, bind: { ...window, bucketSeconds } },
  );
}

/** Start of the oldest summary in the window; null when there is none. */
export async function selectOldestRollup({ sequelize }: Database, window: Window): Promise<Date | null> {
  const [row] = await sequelize.query<{ at: Date | null }>(
    `select min(bucket_at) as at from reading_rollups
     where probe_id = $probeId and bucket_at >= $from and bucket_at < $to`,
    { type: QueryTypes.SELECT, bind: { ...window } },
  );
  return row?.at ?? null;
}

/** Where a probe stood during a window, with what the point asked for. */
export interface StandRow {
  fromAt: Date;
  toAt: Date | null;
  compensationModel: CompensationModelName;
  compensationCoefficientPercentPerK: number | null;
  referenceTemperatureC: number;
}

export function selectStands({ sequelize }: Database, window: Window): Promise<StandRow[]> {
  return sequelize.query<StandRow>(
    `select at.from_at as "fromAt", at.to_at as "toAt", pt.compensation_model as "compensationModel",
       pt.compensation_coefficient_percent_per_k as "compensationCoefficientPercentPerK",
       pt.reference_temperature_c as "referenceTemperatureC"
     from assignments at join points pt on pt.id = at.point_id
     where at.probe_id = $probeId and at.from_at < $to and (at.to_at is null or at.to_at > $from)
     order by at.from_at`,
    { type: QueryTypes.SELECT, bind: { ...window } },
  );
}

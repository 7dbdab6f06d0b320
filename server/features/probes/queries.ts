import { QueryTypes } from 'sequelize';
import type { CellConstantOrigin, ProbeEventKind } from '../../../shared/contracts/vocabulary.ts';
import type { Probe, ProbesQuery } from '../../../shared/contracts/probes.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';
import { resultColumns, type ComparisonRow } from '../readings/queries.ts';

type Database = Pick<Parts, 'sequelize'>;

export interface PlacementRow {
  id: number;
  pointId: number;
  pointCode: string;
  pointName: string;
  areaName: string;
  siteId: number;
  siteName: string;
  fromAt: string;
  toAt: string | null;
}

type Characteristics = Pick<
  Probe,
  | 'id'
  | 'serial'
  | 'tag'
  | 'kind'
  | 'nominalCellConstantPerCm'
  | 'cellConstantPerCm'
  | 'rangeLowUsCm'
  | 'rangeHighUsCm'
  | 'resolutionUsCm'
  | 'temperatureSensor'
  | 'deviceCompensation'
  | 'status'
  | 'siteId'
  | 'siteName'
  | 'retiredReason'
  | 'version'
>;

/** A probe and where it stands. */
export interface ProbeListRow extends Characteristics {
  notes: string;
  placement: PlacementRow | null;
  deviceId: number | null;
  isOnline: boolean | null;
  lastSeenAt: Date | null;
  retiredAt: Date | null;
  sortKey: string | number;
}

export interface ProbeFilter {
  /** null = every site. */
  siteIds: number[] | null;
  siteId: number | null;
  probeIds: number[] | null;
  kind: string | null;
  status: string | null;
  pattern: string | null;
}

const joins = `from probes p
  join sites s on s.id = p.site_id
  left join assignments at on at.probe_id = p.id and at.to_at is null
  left join points pt on pt.id = at.point_id
  left join areas a on a.id = pt.area_id
  left join devices d on d.probe_id = p.id and d.revoked_at is null`;

const matching = `($siteIds::int[] is null or p.site_id = any($siteIds))
  and ($siteId::int is null or p.site_id = $siteId)
  and ($probeIds::int[] is null or p.id = any($probeIds))
  and ($kind::text is null or p.kind = $kind)
  and ($status::text is null or p.status = $status)
  and ($pattern::text is null or p.tag ilike $pattern or p.serial ilike $pattern or pt.code ilike $pattern
    or pt.name ilike $pattern)`;

const placementJson = (point: string, area: string, assignment: string) => `json_build_object(
  'id', ${assignment}.id, 'pointId', ${point}.id, 'pointCode', ${point}.code, 'pointName', ${point}.name,
  'areaName', ${area}.name, 'siteId', ${area}.site_id,
  'siteName', (select name from sites where id = ${area}.site_id),
  'fromAt', ${assignment}.from_at, 'toAt', ${assignment}.to_at)`;

/** What each sort compares. Never null, so that a cursor can hold it: what is missing comes after all letters. */
const sortKeys = {
  tag: { key: 'lower(p.tag)', type: 'text' },
  serial: { key: 'lower(p.serial)', type: 'text' },
  point: { key: `coalesce(lower(pt.code), '~')`, type: 'text' },
  site: { key: `lower(s.name) || ' ' || lower(p.tag)`, type: 'text' },
  lastSeen: { key: `coalesce((extract(epoch from d.last_seen_at) * 1000000)::bigint, 0)`, type: 'bigint' },
} as const;

/** The kind of value a cursor of this sort holds first. */
export const cursorKindOf = (sort: ProbesQuery['sort']): 'text' | 'integer' =>
  sortKeyOf(sort).type === 'text' ? 'text' : 'integer';

const sortKeyOf = (sort: ProbesQuery['sort']) => sortKeys[sort.replace('-', '') as keyof typeof sortKeys];

/** Probes in the order asked for; `limit` null = all of them. */
export function selectProbes(
  { sequelize }: Database,
  filter: ProbeFilter,
  sort: ProbesQuery['sort'],
  after: CursorKey | null,
  limit: number | null,
): Promise<ProbeListRow[]> {
  const { key, type } = sortKeyOf(sort);
  const [direction, beyond] = sort.startsWith('-') ? ['desc', '<'] : ['asc', '>'];
  return sequelize.query<ProbeListRow>(
    `select p.id, p.serial, p.tag, p.kind, p.nominal_cell_constant_per_cm as "nominalCellConstantPerCm",
       p.cell_constant_per_cm as "cellConstantPerCm", p.range_low_us_cm as "rangeLowUsCm",
       p.range_high_us_cm as "rangeHighUsCm", p.resolution_us_cm as "resolutionUsCm",
       p.temperature_sensor as "temperatureSensor", p.device_compensation as "deviceCompensation",
       p.notes, p.status, p.site_id as "siteId", s.name as "siteName", p.retired_at as "retiredAt",
       p.retired_reason as "retiredReason", p.version,
       case when at.id is null then null else ${placementJson('pt', 'a', 'at')} end as placement,
       d.id as "deviceId", d.is_online as "isOnline", d.last_seen_at as "lastSeenAt", ${key} as "sortKey"
     ${joins}
     where ${matching} and ($key::${type} is null or (${key}, p.id) ${beyond} ($key::${type}, $id::bigint))
     order by ${key} ${direction}, p.id ${direction} limit $limit`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter, key: after?.[0] ?? null, id: after?.[1] ?? null, limit },
    },
  );
}

export async function countProbes({ sequelize }: Database, filter: ProbeFilter): Promise<number> {
  const [row] = await sequelize.query<{ total: number }>(
    `select count(*) as total ${joins} where ${matching}`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter },
    },
  );
  return row?.total ?? 0;
}

/** Everywhere the probe has stood, newest first. */
export function selectPlacements({ sequelize }: Database, probeId: number): Promise<PlacementRow[]> {
  return sequelize
    .query<{ placement: PlacementRow }>(
      `select ${placementJson('pt', 'a', 'at')} as placement
       from assignments at join points pt on pt.id = at.point_id join areas a on a.id = pt.area_id
       where at.probe_id = $probeId order by at.from_at desc`,
      { type: QueryTypes.SELECT, bind: { probeId } },
    )
    .then((rows) => rows.map((row) => row.placement));
}

export interface CellConstantRow {
  cellConstantPerCm: number;
  fromAt: Date;
  origin: CellConstantOrigin;
  by: string | null;
  reason: string | null;
}

/** Every value the cell constant had, newest first. */
export function selectCellConstants({ sequelize }: Database, probeId: number): Promise<CellConstantRow[]> {
  return sequelize.query<CellConstantRow>(
    `select c.cell_constant_per_cm as "cellConstantPerCm", c.from_at as "fromAt", c.origin, u.name as by, c.reason
     from cell_constants c left join users u on u.id = c.user_id
     where c.probe_id = $probeId order by c.from_at desc, c.id desc`,
    { type: QueryTypes.SELECT, bind: { probeId } },
  );
}

/** One line of a probe's timeline: something that happened to it, or a comparison. */
export interface TimelineRow extends Partial<Omit<ComparisonRow, 'checkId' | 'pointId' | 'at'>> {
  source: 'check' | 'event';
  id: number;
  at: Date;
  atUs: number;
  kind: ProbeEventKind | 'check';
  detail: Record<string, unknown>;
  pointId: number | null;
  pointName: string | null;
  by: string | null;
  isValid: boolean | null;
  earlierErrorPercent: number[] | null;
}

const eventLines = `select 'event' as source, e.id, e.at, e.kind, e.detail, e.point_id, e.user_id
  from probe_events e where e.probe_id = $probeId`;
const checkLines = `select 'check' as source, c.id, c.at, 'check' as kind,
    jsonb_build_object('solution', c.solution, 'invalidReason', c.invalid_reason) as detail, c.point_id,
    c.performed_by_user_id as user_id
  from checks c where c.probe_id = $probeId`;

/** What happened to a probe and how it compared, newest first. */
export function selectTimeline(
  { sequelize }: Database,
  probeId: number,
  after: CursorKey | null,
  limit: number,
): Promise<TimelineRow[]> {
  return sequelize.query<TimelineRow>(
    `select t.source, t.id, t.at, (extract(epoch from t.at) * 1000000)::bigint as "atUs", t.kind, t.detail,
       t.point_id as "pointId", pt.name as "pointName", u.name as by, c.is_valid as "isValid",
       ${resultColumns},
       case when c.is_valid then array(
         select b.error_percent from checks b
         where b.probe_id = c.probe_id and b.is_valid and (b.at, b.id) < (c.at, c.id)
         order by b.at desc, b.id desc limit 3) end as "earlierErrorPercent"
     from (
       select * from (${eventLines} union all ${checkLines}) lines
       where $us::bigint is null
         or (at, source, id) < (timestamptz 'epoch' + $us * interval '1 microsecond', $source::text, $id::bigint)
       order by at desc, source desc, id desc limit $limit
     ) t
     left join checks c on t.source = 'check' and c.id = t.id
     left join points pt on pt.id = t.point_id
     left join users u on u.id = t.user_id
     order by t.at desc, t.source desc, t.id desc`,
    {
      type: QueryTypes.SELECT,
      bind: { probeId, us: after?.[0] ?? null, source: after?.[1] ?? null, id: after?.[2] ?? null, limit },
    },
  );
}

export async function countTimeline({ sequelize }: Database, probeId: number): Promise<number> {
  const [row] = await sequelize.query<{ total: number }>(
    `select (select count(*) from probe_events where probe_id = $probeId)
       + (select count(*) from checks where probe_id = $probeId) as total`,
    { type: QueryTypes.SELECT, bind: { probeId } },
  );
  return row?.total ?? 0;
}

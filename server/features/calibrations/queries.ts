import { QueryTypes, type Transaction } from 'sequelize';
import type { CalibrationRow as RowOnWire } from '../../../shared/contracts/calibrations.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

type Database = Pick<Parts, 'sequelize'>;

export interface ListedRun extends Omit<RowOnWire, 'startedAt' | 'signedAt' | 'approvedAt'> {
  startedAt: Date;
  signedAt: Date | null;
  approvedAt: Date | null;
  /** Microseconds since 1970: the sort key without loss. */
  startedUs: number;
}

export interface RunFilter {
  /** null = every site. */
  siteIds: number[] | null;
  siteId: number | null;
  pointId: number | null;
  probeId: number | null;
  standardId: number | null;
  performerId: number | null;
  status: string | null;
  outcome: string | null;
  /** Days in the site's own zone, both included. */
  from: string | null;
  to: string | null;
  pattern: string | null;
}

const joins = `from calibrations c
  join probes p on p.id = c.probe_id
  join points pt on pt.id = c.point_id
  join sites s on s.id = c.site_id
  join standards l on l.id = c.standard_id
  join users u on u.id = c.performer_id`;

const matching = `($siteIds::int[] is null or c.site_id = any($siteIds))
  and ($siteId::int is null or c.site_id = $siteId)
  and ($pointId::int is null or c.point_id = $pointId)
  and ($probeId::int is null or c.probe_id = $probeId)
  and ($standardId::int is null or c.standard_id = $standardId or c.second_standard_id = $standardId)
  and ($performerId::int is null or c.performer_id = $performerId)
  and ($status::text is null or c.status = $status)
  and ($outcome::text is null or c.judgement #>> '{cleaned,outcome}' = $outcome)
  and ($from::date is null or c.started_at >= ($from::date)::timestamp at time zone s.time_zone)
  and ($to::date is null or c.started_at < ($to::date + 1)::timestamp at time zone s.time_zone)
  and ($pattern::text is null or c.number ilike $pattern or p.tag ilike $pattern or p.serial ilike $pattern
    or pt.code ilike $pattern or pt.name ilike $pattern or l.code ilike $pattern or u.name ilike $pattern)`;

/** Runs, newest first. */
export function selectRuns(
  { sequelize }: Database,
  filter: RunFilter,
  after: CursorKey | null,
  limit: number,
): Promise<ListedRun[]> {
  return sequelize.query<ListedRun>(
    `select c.id, c.number, c.status, c.probe_id as "probeId", p.tag as "probeTag", p.serial as "probeSerial",
       c.point_id as "pointId", pt.code as "pointCode", pt.name as "pointName", c.site_id as "siteId",
       s.name as "siteName", l.code as "lotCode", c.performer_id as "performerId", u.name as performer,
       c.started_at as "startedAt", c.signed_at as "signedAt", c.approved_at as "approvedAt",
       c.due_on::text as "dueOn", (c.judgement #>> '{asFound,errorPercent}')::float8 as "asFoundErrorPercent",
       (c.judgement #>> '{cleaned,errorPercent}')::float8 as "cleanedErrorPercent",
       (c.judgement #>> '{asLeft,errorPercent}')::float8 as "asLeftErrorPercent",
       c.judgement #>> '{cleaned,outcome}' as outcome,
       coalesce(c.cell_constant_after_per_cm <> c.cell_constant_before_per_cm, false) as "isAdjusted",
       (extract(epoch from c.started_at) * 1000000)::bigint as "startedUs"
     ${joins}
     where ${matching}
       and ($us::bigint is null
         or (c.started_at, c.id) < (timestamptz 'epoch' + $us * interval '1 microsecond', $id::bigint))
     order by c.started_at desc, c.id desc limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...filter, us: after?.[0] ?? null, id: after?.[1] ?? null, limit } },
  );
}

export async function countRuns({ sequelize }: Database, filter: RunFilter): Promise<number> {
  const [row] = await sequelize.query<{ total: number }>(
    `select count(*) as total ${joins} where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}

/** The next number of a site in a year. The row is locked until the transaction ends: no gap, no number twice. */
export async function countUp(
  { sequelize }: Database,
  transaction: Transaction,
  siteId: number,
  year: number,
): Promise<number> {
  const [row] = await sequelize.query<{ number: number }>(
    `insert into calibration_counters as c (site_id, year, last_number) values ($siteId, $year, 1)
     on conflict (site_id, year) do update set last_number = c.last_number + 1
     returning last_number as number`,
    { type: QueryTypes.SELECT, bind: { siteId, year }, transaction },
  );
  return row!.number;
}

export interface TakenCommand {
  id: number;
  calibrationId: number;
  siteId: number;
  probeId: number;
  deviceId: number;
  deviceName: string;
  cellConstantPerCm: number;
}

/** Takes every order that nobody has sent yet. */
export function takeWaitingCommands({ sequelize }: Database, now: Date): Promise<TakenCommand[]> {
  return sequelize.query<TakenCommand>(
    `update device_commands k set sent_at = $now
     from devices d, calibrations c
     where d.id = k.device_id and c.id = k.calibration_id and k.state = 'waiting' and k.sent_at is null
     returning k.id, k.calibration_id as "calibrationId", c.site_id as "siteId", d.probe_id as "probeId",
       k.device_id as "deviceId", d.name as "deviceName", k.cell_constant_per_cm as "cellConstantPerCm"`,
    { type: QueryTypes.SELECT, bind: { now } },
  );
}

/** What was sent by a server that did not live to hear the answer. */
export function takeAbandonedCommands({ sequelize }: Database, sentBefore: Date): Promise<TakenCommand[]> {
  return sequelize.query<TakenCommand>(
    `select k.id, k.calibration_id as "calibrationId", c.site_id as "siteId", d.probe_id as "probeId",
       k.device_id as "deviceId", d.name as "deviceName", k.cell_constant_per_cm as "cellConstantPerCm"
     from device_commands k join devices d on d.id = k.device_id join calibrations c on c.id = k.calibration_id
     where k.state = 'waiting' and k.sent_at < $sentBefore`,
    { type: QueryTypes.SELECT, bind: { sentBefore } },
  );
}

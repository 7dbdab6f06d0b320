import { QueryTypes, type Transaction } from 'sequelize';
import type { Prompt } from '../../../shared/contracts/prompts.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

type Database = Pick<Parts, 'sequelize'>;

/** A probe where it stands, with the day it is due and the day it is there now. */
export interface DueRow {
  probeId: number;
  probeTag: string;
  pointId: number;
  pointName: string;
  siteId: number;
  siteName: string;
  /** Null when it has never been calibrated or checked by a person. */
  dueOn: string | null;
  today: string;
}

/**
 * Due is what the newest calibration in effect has set; before the first one, the point's interval counts from the last
 * comparison that a person made after cleaning. Days are those of the site.
 */
export function selectDueProbes(
  { sequelize }: Database,
  now: Date,
  probeId: number | null,
  transaction: Transaction | null,
): Promise<DueRow[]> {
  return sequelize.query<DueRow>(
    `select p.id as "probeId", p.tag as "probeTag", pt.id as "pointId", pt.name as "pointName",
       s.id as "siteId", s.name as "siteName",
       coalesce(k.due_on, (c.at at time zone s.time_zone)::date + pt.interval_days)::text as "dueOn",
       ($now::timestamptz at time zone s.time_zone)::date::text as today
     from assignments at
     join probes p on p.id = at.probe_id
     join points pt on pt.id = at.point_id
     join areas a on a.id = pt.area_id
     join sites s on s.id = a.site_id
     left join lateral (
       select due_on from calibrations where probe_id = p.id and due_on is not null
       order by started_at desc, id desc limit 1
     ) k on true
     left join lateral (
       select at from checks where probe_id = p.id and is_valid and stage in ('as-left', 'as-found-cleaned')
       order by at desc, id desc limit 1
     ) c on true
     where at.to_at is null and ($probeId::int is null or p.id = $probeId)
     order by p.id`,
    { type: QueryTypes.SELECT, bind: { now, probeId }, transaction },
  );
}

export interface Recipient {
  id: number;
  name: string;
  email: string;
}

/** Managers of a site: by a role there, or at all sites when they have no other role there. */
export function selectManagers(
  { sequelize }: Database,
  siteId: number,
  today: string,
  transaction: Transaction,
): Promise<Recipient[]> {
  return sequelize.query<Recipient>(
    `select u.id, u.name, u.email from users u
     where u.deactivated_at is null and (
       select m.role from memberships m
       where m.user_id = u.id and m.ended_at is null and (m.ends_on is null or m.ends_on >= $today)
         and (m.site_id = $siteId or m.site_id is null)
       order by m.site_id nulls last limit 1
     ) = 'manager'
     order by u.id`,
    { type: QueryTypes.SELECT, bind: { siteId, today }, transaction },
  );
}

export interface PromptRow extends Omit<Prompt, 'raisedAt' | 'closedAt'> {
  raisedAt: Date;
  closedAt: Date | null;
}

export interface PromptFilter {
  /** null = every site. */
  siteIds: number[] | null;
  siteId: number | null;
  isOpen: boolean;
  pattern: string | null;
}

const joins = `from prompts q
  join probes p on p.id = q.probe_id
  join points pt on pt.id = q.point_id
  join sites s on s.id = q.site_id`;

const matching = `($siteIds::int[] is null or q.site_id = any($siteIds))
  and ($siteId::int is null or q.site_id = $siteId)
  and (not $isOpen::boolean or q.closed_at is null)
  and ($pattern::text is null or p.tag ilike $pattern or pt.name ilike $pattern or s.name ilike $pattern)`;

/** The longest due first. */
export function selectPrompts(
  { sequelize }: Database,
  filter: PromptFilter,
  after: CursorKey | null,
  limit: number,
): Promise<PromptRow[]> {
  return sequelize.query<PromptRow>(
    `select q.id, q.kind, q.probe_id as "probeId", p.tag as "probeTag", q.point_id as "pointId",
       pt.name as "pointName", q.site_id as "siteId", s.name as "siteName", q.due_on::text as "dueOn",
       q.raised_at as "raisedAt", q.closed_at as "closedAt"
     ${joins} where ${matching} and ($dueOn::date is null or (q.due_on, q.id) > ($dueOn::date, $id::bigint))
     order by q.due_on, q.id limit $limit`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter, dueOn: after?.[0] ?? null, id: after?.[1] ?? null, limit },
    },
  );
}

export async function countPrompts({ sequelize }: Database, filter: PromptFilter): Promise<number> {
  const [row] = await sequelize.query<{ total: number }>(
    `select count(*) as total ${joins} where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}

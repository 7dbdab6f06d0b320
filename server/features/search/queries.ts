import { QueryTypes } from 'sequelize';
import type { SearchHit } from '../../../shared/contracts/search.ts';
import type { Parts } from '../../parts.ts';

/**
 * Probes by tag or serial and points by code or name, whole matches first, then beginnings, then the rest.
 * Retired ones come last: their history stays findable.
 */
export function selectHits(
  parts: Pick<Parts, 'sequelize'>,
  search: { text: string; contains: string; begins: string; siteIds: number[] | null },
  limit: number,
): Promise<SearchHit[]> {
  return parts.sequelize.query<SearchHit>(
    `with hits as (
       select 'probe' as kind, p.id, p.id as probe_id, p.tag || ' · ' || p.serial as title,
         coalesce(s.name || ' · ' || a.name || ' · ' || pt.name, s.name || ' · not installed') as subtitle,
         p.site_id, p.status = 'retired' as is_retired, array[lower(p.tag), lower(p.serial)] as names
       from probes p
       join sites s on s.id = p.site_id
       left join assignments at on at.probe_id = p.id and at.to_at is null
       left join points pt on pt.id = at.point_id
       left join areas a on a.id = pt.area_id
       where ($siteIds::int[] is null or p.site_id = any($siteIds))
         and (p.tag ilike $contains or p.serial ilike $contains)
       union all
       select 'point', pt.id, at.probe_id, pt.code || ' · ' || pt.name,
         s.name || ' · ' || a.name, a.site_id, pt.retired_at is not null, array[lower(pt.code), lower(pt.name)]
       from points pt
       join areas a on a.id = pt.area_id
       join sites s on s.id = a.site_id
       left join assignments at on at.point_id = pt.id and at.to_at is null
       where ($siteIds::int[] is null or a.site_id = any($siteIds))
         and (pt.code ilike $contains or pt.name ilike $contains)
     )
     select kind, id, probe_id as "probeId", title, subtitle, site_id as "siteId" from hits
     order by is_retired,
       case when lower($text) = any(names) then 0 when names[1] like lower($begins) or names[2] like lower($begins) then 1 else 2 end,
       names[1], kind, id
     limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...search, limit } },
  );
}

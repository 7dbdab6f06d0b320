import { QueryTypes } from 'sequelize';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

export interface AreaRow {
  id: number;
  siteId: number;
  name: string;
  position: number;
  pointCount: number;
}

export interface SiteRow {
  id: number;
  code: string;
  name: string;
  timeZone: string;
  version: number;
  pointCount: number;
  probeCount: number;
  areas: AreaRow[];
  sortName: string;
}

export interface SiteFilter {
  /** null = every site. */
  siteIds: number[] | null;
  pattern: string | null;
}

const matching = `s.retired_at is null
  and ($siteIds::int[] is null or s.id = any($siteIds))
  and ($pattern::text is null or s.name ilike $pattern or s.code ilike $pattern)`;

/** Sites with their areas and how much stands in them, by name. */
export function selectSites(
  parts: Pick<Parts, 'sequelize'>,
  filter: SiteFilter,
  after: CursorKey | null,
  limit: number | null,
): Promise<SiteRow[]> {
  return parts.sequelize.query<SiteRow>(
    `select s.id, s.code, s.name, s.time_zone as "timeZone", s.version, lower(s.name) as "sortName",
       (select count(*) from points p join areas a on a.id = p.area_id
         where a.site_id = s.id and p.retired_at is null) as "pointCount",
       (select count(*) from probes p where p.site_id = s.id and p.status <> 'retired') as "probeCount",
       coalesce((
         select json_agg(json_build_object('id', a.id, 'siteId', a.site_id, 'name', a.name, 'position', a.position,
           'pointCount', (select count(*) from points p where p.area_id = a.id and p.retired_at is null))
           order by a.position, a.id)
         from areas a where a.site_id = s.id), '[]') as areas
     from sites s
     where ${matching} and ($name::text is null or (lower(s.name), s.id) > ($name, $id::bigint))
     order by lower(s.name), s.id limit $limit`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter, name: after?.[0] ?? null, id: after?.[1] ?? null, limit },
    },
  );
}

export async function countSites(parts: Pick<Parts, 'sequelize'>, filter: SiteFilter): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total from sites s where ${matching}`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter },
    },
  );
  return row?.total ?? 0;
}

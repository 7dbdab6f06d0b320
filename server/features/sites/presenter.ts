import type { Area, Site } from '../../../shared/contracts/sites.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { pointPolicy } from '../points/policy.ts';
import { probePolicy } from '../probes/policy.ts';
import { sitePolicy } from './policy.ts';
import type { AreaRow, SiteRow } from './queries.ts';

export const presentArea = ({ id, siteId, name, position, pointCount }: AreaRow): Area => ({
  id,
  siteId,
  name,
  position,
  pointCount,
});

export const presentSite = (row: SiteRow, actor: Actor): Site => ({
  id: row.id,
  code: row.code,
  name: row.name,
  timeZone: row.timeZone,
  areas: row.areas.map(presentArea),
  pointCount: row.pointCount,
  probeCount: row.probeCount,
  version: row.version,
  can: {
    change: may(sitePolicy, 'change', actor, row.id),
    addArea: may(sitePolicy, 'addArea', actor, row.id),
    addPoint: may(pointPolicy, 'create', actor, row.id),
    registerProbe: may(probePolicy, 'register', actor, row.id),
  },
});

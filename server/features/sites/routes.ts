import { idPath, listOf, listQuery } from '../../../shared/contracts/common.ts';
import {
  area,
  changeSite,
  createArea,
  createSite,
  renameArea,
  site,
} from '../../../shared/contracts/sites.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentArea, presentSite } from './presenter.ts';
import * as sites from './service.ts';

export const siteRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/sites',
    access: 'session',
    does: 'Lists the sites the person has a role at, with their areas.',
    query: listQuery,
    answer: listOf(site),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await sites.listSites(parts, actor, query);
      return { items: items.map((row) => presentSite(row, actor)), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/sites',
    access: 'session',
    does: 'Adds a site.',
    body: createSite,
    answer: site,
    status: 201,
    run: async ({ parts, actor, body }) => presentSite(await sites.createSite(parts, actor, body), actor),
  }),
  route({
    verb: 'get',
    path: '/api/sites/:id',
    access: 'session',
    does: 'Shows one site with its areas.',
    params: idPath,
    answer: site,
    run: async ({ parts, actor, params }) =>
      presentSite(await sites.readSite(parts, actor, params.id), actor),
  }),
  route({
    verb: 'patch',
    path: '/api/sites/:id',
    access: 'session',
    does: 'Changes a site’s name or time zone.',
    params: idPath,
    body: changeSite,
    answer: site,
    run: async ({ parts, actor, params, body }) =>
      presentSite(await sites.changeSite(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/sites/:id/areas',
    access: 'session',
    does: 'Adds an area to a site.',
    params: idPath,
    body: createArea,
    answer: area,
    status: 201,
    run: async ({ parts, actor, params, body }) =>
      presentArea(await sites.addArea(parts, actor, params.id, body)),
  }),
  route({
    verb: 'patch',
    path: '/api/areas/:id',
    access: 'session',
    does: 'Renames an area.',
    params: idPath,
    body: renameArea,
    answer: area,
    run: async ({ parts, actor, params, body }) =>
      presentArea(await sites.renameArea(parts, actor, params.id, body)),
  }),
];

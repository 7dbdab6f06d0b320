import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  changePoint,
  createPoint,
  holdPoint,
  point,
  pointProbe,
  pointsQuery,
  retirePoint,
} from '../../../shared/contracts/points.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentPoint, presentPointProbe } from './presenter.ts';
import * as points from './service.ts';

export const pointRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/points',
    access: 'session',
    does: 'Lists measuring points by site, area and code.',
    query: pointsQuery,
    answer: listOf(point),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await points.listPoints(parts, actor, query);
      return { items: items.map((row) => presentPoint(row, actor)), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/points',
    access: 'session',
    does: 'Adds a measuring point with its requirements.',
    body: createPoint,
    answer: point,
    status: 201,
    run: async ({ parts, actor, body }) => presentPoint(await points.createPoint(parts, actor, body), actor),
  }),
  route({
    verb: 'get',
    path: '/api/points/:id',
    access: 'session',
    does: 'Shows one measuring point.',
    params: idPath,
    answer: point,
    run: async ({ parts, actor, params }) =>
      presentPoint(await points.readPoint(parts, actor, params.id), actor),
  }),
  route({
    verb: 'get',
    path: '/api/points/:id/probes',
    access: 'session',
    does: 'Lists the probes that stood at a measuring point, newest first.',
    params: idPath,
    answer: listOf(pointProbe),
    run: async ({ parts, actor, params }) => {
      const items = await points.listPointProbes(parts, actor, params.id);
      return { items: items.map(presentPointProbe), total: items.length, nextCursor: null };
    },
  }),
  route({
    verb: 'patch',
    path: '/api/points/:id',
    access: 'session',
    does: 'Changes a measuring point’s requirements, with a reason.',
    params: idPath,
    body: changePoint,
    answer: point,
    run: async ({ parts, actor, params, body }) =>
      presentPoint(await points.changePoint(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/points/:id/retire',
    access: 'session',
    does: 'Retires a measuring point that holds no probe.',
    params: idPath,
    body: retirePoint,
    answer: point,
    run: async ({ parts, actor, params, body }) =>
      presentPoint(await points.retirePoint(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/points/:id/hold',
    access: 'session',
    does: 'Holds a point for maintenance until a time.',
    params: idPath,
    body: holdPoint,
    answer: point,
    status: 201,
    run: async ({ parts, actor, params, body }) =>
      presentPoint(await points.holdPoint(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'delete',
    path: '/api/points/:id/hold',
    access: 'session',
    does: 'Puts a held point back into use.',
    params: idPath,
    answer: point,
    run: async ({ parts, actor, params }) =>
      presentPoint(await points.releasePoint(parts, actor, params.id), actor),
  }),
];

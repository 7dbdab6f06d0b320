import { check, checksQuery } from '../../../shared/contracts/checks.ts';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentCheck } from './presenter.ts';
import * as checks from './service.ts';

export const checkRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/checks',
    access: 'session',
    does: 'Lists comparisons with reference solutions, newest first.',
    query: checksQuery,
    answer: listOf(check),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await checks.listChecks(parts, actor, query);
      return { items: items.map(presentCheck), ...rest };
    },
  }),
  route({
    verb: 'get',
    path: '/api/checks/:id',
    access: 'session',
    does: 'Shows one comparison with its uncertainty budget.',
    params: idPath,
    answer: check,
    run: async ({ parts, actor, params }) => presentCheck(await checks.readCheck(parts, actor, params.id)),
  }),
];

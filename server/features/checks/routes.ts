import { check, checkHistory, checkHistoryQuery, checksQuery } from '../../../shared/contracts/checks.ts';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentCheck, presentHistory } from './presenter.ts';
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
    path: '/api/checks/history',
    access: 'session',
    does: 'Gives what a probe’s cell constant was found to be, in at most 1 000 points.',
    query: checkHistoryQuery,
    answer: checkHistory,
    run: async ({ parts, actor, query }) =>
      presentHistory(await checks.readHistory(parts, actor, query.probeId)),
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

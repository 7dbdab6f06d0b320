import { searchAnswer, searchQuery } from '../../../shared/contracts/search.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { search } from './service.ts';

export const searchRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/search',
    access: 'session',
    does: 'Finds probes by tag or serial number and measuring points by code or name.',
    query: searchQuery,
    answer: searchAnswer,
    run: async ({ parts, actor, query }) => ({ items: await search(parts, actor, query.q) }),
  }),
];

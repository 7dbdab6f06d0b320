import { liveBoard, liveQuery, series, seriesQuery } from '../../../shared/contracts/readings.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { readLiveBoard } from './live-board.ts';
import { presentSeries } from './presenter.ts';
import { readSeries } from './service.ts';

export const readingRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/readings/live',
    access: 'session',
    does: 'Shows one site’s points as they read now, or over all sites those that need a person first.',
    query: liveQuery,
    answer: liveBoard,
    run: ({ parts, actor, query }) => readLiveBoard(parts, actor, query.siteId),
  }),
  route({
    verb: 'get',
    path: '/api/readings',
    access: 'session',
    does: 'Gives the history of one probe in at most 1 000 points.',
    query: seriesQuery,
    answer: series,
    run: async ({ parts, actor, query }) => presentSeries(await readSeries(parts, actor, query)),
  }),
];

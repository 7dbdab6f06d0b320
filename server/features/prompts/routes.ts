import { listOf } from '../../../shared/contracts/common.ts';
import { prompt, promptsQuery } from '../../../shared/contracts/prompts.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentPrompt } from './presenter.ts';
import * as prompts from './service.ts';

export const promptRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/prompts',
    access: 'session',
    does: 'Lists work that waits: calibrations due soon and overdue, the longest due first.',
    query: promptsQuery,
    answer: listOf(prompt),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await prompts.listPrompts(parts, actor, query);
      return { items: items.map(presentPrompt), ...rest };
    },
  }),
];

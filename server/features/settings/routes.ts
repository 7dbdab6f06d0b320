import { z } from 'zod';
import { listOf } from '../../../shared/contracts/common.ts';
import { changeSetting, setting } from '../../../shared/contracts/settings.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentSetting } from './presenter.ts';
import * as settings from './service.ts';

export const settingRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/settings',
    access: 'session',
    does: 'Lists the organisation’s settings.',
    answer: listOf(setting),
    run: async ({ actor }) => {
      const rows = await settings.listSettings();
      return { items: rows.map((row) => presentSetting(row, actor)), total: rows.length, nextCursor: null };
    },
  }),
  route({
    verb: 'put',
    path: '/api/settings/:key',
    access: 'session',
    does: 'Changes one setting, with the reason.',
    params: z.object({ key: z.string().max(60) }),
    body: changeSetting,
    answer: setting,
    run: async ({ parts, actor, params, body }) =>
      presentSetting(await settings.changeSetting(parts, actor, params.key, body), actor),
  }),
];

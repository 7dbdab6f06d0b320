import { idPath, listOf } from '../../../shared/contracts/common.ts';
import { closeNotice, notice, noticesQuery } from '../../../shared/contracts/notices.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentNotice } from './presenter.ts';
import * as notices from './service.ts';

export const noticeRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/notices',
    access: 'session',
    does: 'Lists integrity notices of the sites granted.',
    query: noticesQuery,
    answer: listOf(notice),
    run: async ({ actor, query }) => {
      const { rows, total, nextCursor } = await notices.listNotices(actor, query);
      return { items: rows.map((row) => presentNotice(row, actor)), total, nextCursor };
    },
  }),
  route({
    verb: 'post',
    path: '/api/notices/:id/close',
    access: 'session',
    does: 'Closes a notice with the reason.',
    params: idPath,
    body: closeNotice,
    answer: notice,
    run: async ({ parts, actor, params, body }) =>
      presentNotice(await notices.closeNotice(parts, actor, params.id, body.reason), actor),
  }),
];

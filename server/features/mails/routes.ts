import { listOf, listQuery } from '../../../shared/contracts/common.ts';
import { mail } from '../../../shared/contracts/mails.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentMail } from './presenter.ts';
import { listMails } from './service.ts';

export const mailRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/mails',
    access: 'session',
    does: 'Lists the outbox, newest first.',
    query: listQuery,
    answer: listOf(mail),
    run: async ({ actor, query }) => {
      const { rows, total, nextCursor } = await listMails(actor, query);
      return { items: rows.map(presentMail), total, nextCursor };
    },
  }),
];

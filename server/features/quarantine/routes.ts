import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  quarantinedMessage,
  quarantineQuery,
  resolveQuarantined,
} from '../../../shared/contracts/quarantine.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentQuarantined } from './presenter.ts';
import * as quarantine from './service.ts';

export const quarantineRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/quarantine',
    access: 'session',
    does: 'Lists the device messages that could not be used, with reason and raw content.',
    query: quarantineQuery,
    answer: listOf(quarantinedMessage),
    run: async ({ actor, query }) => {
      const { rows, total, nextCursor } = await quarantine.listQuarantined(actor, query);
      return { items: rows.map(presentQuarantined), total, nextCursor };
    },
  }),
  route({
    verb: 'get',
    path: '/api/quarantine/:id',
    access: 'session',
    does: 'Shows one quarantined message with its raw content.',
    params: idPath,
    answer: quarantinedMessage,
    run: async ({ actor, params }) => presentQuarantined(await quarantine.readQuarantined(actor, params.id)),
  }),
  route({
    verb: 'post',
    path: '/api/quarantine/:id/resolve',
    access: 'session',
    does: 'Marks a quarantined message as dealt with; it stays readable.',
    params: idPath,
    body: resolveQuarantined,
    answer: quarantinedMessage,
    run: async ({ parts, actor, params, body }) =>
      presentQuarantined(await quarantine.resolveQuarantined(parts, actor, params.id, body.reason)),
  }),
];

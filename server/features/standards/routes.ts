import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  changeStandardState,
  createStandard,
  standard,
  standardsQuery,
} from '../../../shared/contracts/standards.ts';
import type { Actor } from '../../http/actor.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { presentStandard } from './presenter.ts';
import type { StandardRow } from './queries.ts';
import * as standards from './service.ts';

const present = (parts: Parts, actor: Actor) => (row: StandardRow) =>
  presentStandard(row, actor, parts.clock.now().toISOString().slice(0, 10));

export const standardRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/standards',
    access: 'session',
    does: 'Lists the lots of reference solution by code.',
    query: standardsQuery,
    answer: listOf(standard),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await standards.listStandards(parts, actor, query);
      return { items: items.map(present(parts, actor)), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/standards',
    access: 'session',
    does: 'Registers a lot as its certificate states it; it is quarantined until released.',
    body: createStandard,
    answer: standard,
    status: 201,
    run: async ({ parts, actor, body }) =>
      present(parts, actor)(await standards.createStandard(parts, actor, body)),
  }),
  route({
    verb: 'get',
    path: '/api/standards/:id',
    access: 'session',
    does: 'Shows one lot.',
    params: idPath,
    answer: standard,
    run: async ({ parts, actor, params }) =>
      present(parts, actor)(await standards.readStandard(parts, actor, params.id)),
  }),
  route({
    verb: 'post',
    path: '/api/standards/:id/state',
    access: 'session',
    does: 'Releases, quarantines or recalls a lot, with a reason.',
    params: idPath,
    body: changeStandardState,
    answer: standard,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await standards.changeStandardState(parts, actor, params.id, body)),
  }),
];

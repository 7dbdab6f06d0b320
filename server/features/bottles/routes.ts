import { z } from 'zod';
import {
  bottle,
  bottlesQuery,
  discardBottle,
  openBottle,
  receiveBottles,
  setRemaining,
} from '../../../shared/contracts/bottles.ts';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import type { Actor } from '../../http/actor.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { labelSvg } from './label.ts';
import { presentBottle } from './presenter.ts';
import type { BottleRow } from './queries.ts';
import * as bottles from './service.ts';

const present = (parts: Parts, actor: Actor) => (row: BottleRow) =>
  presentBottle(row, actor, parts.clock.now().toISOString().slice(0, 10));

export const bottleRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/bottles',
    access: 'session',
    does: 'Lists bottles by code, of one lot, at one site, or only the usable ones.',
    query: bottlesQuery,
    answer: listOf(bottle),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await bottles.listBottles(parts, actor, query);
      return { items: items.map(present(parts, actor)), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/bottles',
    access: 'session',
    does: 'Takes bottles of a lot into stock and numbers them.',
    body: receiveBottles,
    answer: z.object({ items: z.array(bottle) }),
    status: 201,
    run: async ({ parts, actor, body }) => ({
      items: (await bottles.receiveBottles(parts, actor, body)).map(present(parts, actor)),
    }),
  }),
  route({
    verb: 'get',
    path: '/api/bottles/:id',
    access: 'session',
    does: 'Shows one bottle.',
    params: idPath,
    answer: bottle,
    run: async ({ parts, actor, params }) =>
      present(parts, actor)(await bottles.readBottle(parts, actor, params.id)),
  }),
  route({
    verb: 'get',
    path: '/api/bottles/:id/label.svg',
    access: 'session',
    does: 'Draws the label of a bottle, with its code to scan.',
    params: idPath,
    sends: ['image/svg+xml'],
    run: async ({ parts, actor, params }) => ({
      mediaType: 'image/svg+xml',
      bytes: labelSvg(await bottles.readBottle(parts, actor, params.id)),
    }),
  }),
  route({
    verb: 'post',
    path: '/api/bottles/:id/open',
    access: 'session',
    does: 'Opens a bottle: its time after opening begins.',
    params: idPath,
    body: openBottle,
    answer: bottle,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await bottles.openBottle(parts, actor, params.id, body)),
  }),
  route({
    verb: 'post',
    path: '/api/bottles/:id/remaining',
    access: 'session',
    does: 'Says what is left in an open bottle.',
    params: idPath,
    body: setRemaining,
    answer: bottle,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await bottles.setRemaining(parts, actor, params.id, body)),
  }),
  route({
    verb: 'post',
    path: '/api/bottles/:id/discard',
    access: 'session',
    does: 'Discards a bottle, with a reason.',
    params: idPath,
    body: discardBottle,
    answer: bottle,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await bottles.discardBottle(parts, actor, params.id, body)),
  }),
];

import { attachCertificate } from '../../../shared/contracts/certificates.ts';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  changeInstrument,
  createInstrument,
  instrument,
  instrumentsQuery,
  instrumentUse,
} from '../../../shared/contracts/instruments.ts';
import type { Actor } from '../../http/actor.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { presentInstrument, presentInstrumentUse } from './presenter.ts';
import type { InstrumentRow } from './queries.ts';
import * as instruments from './service.ts';

const present = (parts: Parts, actor: Actor) => (row: InstrumentRow) =>
  presentInstrument(row, actor, parts.clock.now().toISOString().slice(0, 10));

export const instrumentRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/instruments',
    access: 'session',
    does: 'Lists the reference instruments by kind and code.',
    query: instrumentsQuery,
    answer: listOf(instrument),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await instruments.listInstruments(parts, actor, query);
      return { items: items.map(present(parts, actor)), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/instruments',
    access: 'session',
    does: 'Registers a reference instrument as its certificate states it.',
    body: createInstrument,
    answer: instrument,
    status: 201,
    run: async ({ parts, actor, body }) =>
      present(parts, actor)(await instruments.createInstrument(parts, actor, body)),
  }),
  route({
    verb: 'get',
    path: '/api/instruments/:id',
    access: 'session',
    does: 'Shows one reference instrument.',
    params: idPath,
    answer: instrument,
    run: async ({ parts, actor, params }) =>
      present(parts, actor)(await instruments.readInstrument(parts, actor, params.id)),
  }),
  route({
    verb: 'get',
    path: '/api/instruments/:id/uses',
    access: 'session',
    does: 'Lists the newest calibrations that used the instrument.',
    params: idPath,
    answer: listOf(instrumentUse),
    run: async ({ parts, actor, params }) => {
      const rows = await instruments.listInstrumentUses(parts, actor, params.id);
      return { items: rows.map(presentInstrumentUse), total: rows.length, nextCursor: null };
    },
  }),
  route({
    verb: 'patch',
    path: '/api/instruments/:id',
    access: 'session',
    does: 'Changes what is known of an instrument, or takes it out of use, with a reason.',
    params: idPath,
    body: changeInstrument,
    answer: instrument,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await instruments.changeInstrument(parts, actor, params.id, body)),
  }),
  route({
    verb: 'post',
    path: '/api/instruments/:id/certificate',
    access: 'session',
    does: 'Attaches a certificate file to an instrument.',
    params: idPath,
    body: attachCertificate,
    answer: instrument,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await instruments.attachCertificate(parts, actor, params.id, body)),
  }),
];

import { attachCertificate } from '../../../shared/contracts/certificates.ts';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  createDilutedStandard,
  createPreparedStandard,
  dilutedPreparation,
  preparation,
  weighedPreparation,
} from '../../../shared/contracts/preparations.ts';
import {
  changeStandardState,
  createStandard,
  standard,
  standardStateChange,
  standardsQuery,
  standardUses,
} from '../../../shared/contracts/standards.ts';
import type { Actor } from '../../http/actor.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { presentStandard } from './presenter.ts';
import * as preparations from './preparations.ts';
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
  route({
    verb: 'get',
    path: '/api/standards/:id/history',
    access: 'session',
    does: 'Lists the states of a lot, newest first.',
    params: idPath,
    answer: listOf(standardStateChange),
    run: async ({ parts, actor, params }) => {
      const rows = await standards.listStateChanges(parts, actor, params.id);
      const items = rows.map((row) => ({ ...row, at: row.at.toISOString() }));
      return { items, total: items.length, nextCursor: null };
    },
  }),
  route({
    verb: 'get',
    path: '/api/standards/:id/uses',
    access: 'session',
    does: 'Says where a lot was used, and what a recall would touch.',
    params: idPath,
    answer: standardUses,
    run: async ({ parts, actor, params }) => {
      const { probes, ...rest } = await standards.readUses(parts, actor, params.id);
      return { probes: probes.map((row) => ({ ...row, lastUsedAt: row.lastUsedAt.toISOString() })), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/standards/:id/certificate',
    access: 'session',
    does: 'Attaches a certificate file to a lot.',
    params: idPath,
    body: attachCertificate,
    answer: standard,
    run: async ({ parts, actor, params, body }) =>
      present(parts, actor)(await standards.attachCertificate(parts, actor, params.id, body)),
  }),
  route({
    verb: 'post',
    path: '/api/standards/prepared/preview',
    access: 'session',
    does: 'Works out what two weighings of salt and water give, and its U; stores nothing.',
    body: weighedPreparation,
    answer: preparation,
    run: ({ parts, actor, body }) => preparations.previewWeighing(parts, actor, body),
  }),
  route({
    verb: 'post',
    path: '/api/standards/prepared',
    access: 'session',
    does: 'Makes an in-house lot by weighing salt and water; it is quarantined until released.',
    body: createPreparedStandard,
    answer: standard,
    status: 201,
    run: async ({ parts, actor, body }) =>
      present(parts, actor)(await preparations.createPreparedStandard(parts, actor, body)),
  }),
  route({
    verb: 'post',
    path: '/api/standards/diluted/preview',
    access: 'session',
    does: 'Works out what diluting a lot by mass gives, and its U; stores nothing.',
    body: dilutedPreparation,
    answer: preparation,
    run: ({ parts, actor, body }) => preparations.previewDilution(parts, actor, body),
  }),
  route({
    verb: 'post',
    path: '/api/standards/diluted',
    access: 'session',
    does: 'Makes an in-house check solution by diluting a lot; it is quarantined until released.',
    body: createDilutedStandard,
    answer: standard,
    status: 201,
    run: async ({ parts, actor, body }) =>
      present(parts, actor)(await preparations.createDilutedStandard(parts, actor, body)),
  }),
];

import { idPath, listOf, listQuery } from '../../../shared/contracts/common.ts';
import {
  addProbeNote,
  changeProbe,
  installProbe,
  moveProbe,
  probe,
  probeEvent,
  probeRow,
  probesQuery,
  registerProbe,
  removeProbe,
  retireProbe,
} from '../../../shared/contracts/probes.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import * as placements from './placements.ts';
import { presentProbe, presentProbeRow, presentTimelineRow } from './presenter.ts';
import * as registration from './registration.ts';
import * as probes from './service.ts';

export const probeRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/probes',
    access: 'session',
    does: 'Lists probes with where they stand, their trust and their last comparison.',
    query: probesQuery,
    answer: listOf(probeRow),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await probes.listProbes(parts, actor, query);
      return { items: items.map(({ row, verdict }) => presentProbeRow(row, verdict)), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/probes',
    access: 'session',
    does: 'Registers a probe as its nameplate states it.',
    body: registerProbe,
    answer: probe,
    status: 201,
    run: async ({ parts, actor, body }) =>
      presentProbe(await registration.registerProbe(parts, actor, body), actor),
  }),
  route({
    verb: 'get',
    path: '/api/probes/:id',
    access: 'session',
    does: 'Shows one probe: its verdict, where it stood and when, its device and its cell constants.',
    params: idPath,
    answer: probe,
    run: async ({ parts, actor, params }) =>
      presentProbe(await probes.readProbe(parts, actor, params.id), actor),
  }),
  route({
    verb: 'patch',
    path: '/api/probes/:id',
    access: 'session',
    does: 'Changes what is recorded about a probe, with a reason.',
    params: idPath,
    body: changeProbe,
    answer: probe,
    run: async ({ parts, actor, params, body }) =>
      presentProbe(await registration.changeProbe(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/probes/:id/install',
    access: 'session',
    does: 'Installs a probe at a free measuring point.',
    params: idPath,
    body: installProbe,
    answer: probe,
    run: async ({ parts, actor, params, body }) =>
      presentProbe(await placements.installProbe(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/probes/:id/move',
    access: 'session',
    does: 'Moves an installed probe to another point; credentials and history go with it.',
    params: idPath,
    body: moveProbe,
    answer: probe,
    run: async ({ parts, actor, params, body }) =>
      presentProbe(await placements.moveProbe(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/probes/:id/remove',
    access: 'session',
    does: 'Takes a probe out of its point and keeps it as a spare.',
    params: idPath,
    body: removeProbe,
    answer: probe,
    run: async ({ parts, actor, params, body }) =>
      presentProbe(await placements.removeProbe(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/probes/:id/retire',
    access: 'session',
    does: 'Retires a probe for good and withdraws its device’s credentials.',
    params: idPath,
    body: retireProbe,
    answer: probe,
    run: async ({ parts, actor, params, body }) =>
      presentProbe(await placements.retireProbe(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/probes/:id/notes',
    access: 'session',
    does: 'Writes a note into a probe’s timeline.',
    params: idPath,
    body: addProbeNote,
    answer: probeEvent,
    status: 201,
    run: async ({ parts, actor, params, body }) =>
      presentTimelineRow(await probes.addNote(parts, actor, params.id, body.text)),
  }),
  route({
    verb: 'get',
    path: '/api/probes/:id/events',
    access: 'session',
    does: 'Lists what happened to a probe and how it compared, newest first.',
    params: idPath,
    query: listQuery,
    answer: listOf(probeEvent),
    run: async ({ parts, actor, params, query }) => {
      const { items, ...rest } = await probes.listTimeline(parts, actor, params.id, query);
      return { items: items.map(presentTimelineRow), ...rest };
    },
  }),
];

import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  device,
  devicesQuery,
  issueCredentials,
  issuedCredentials,
  replaceCredentials,
  revokeCredentials,
} from '../../../shared/contracts/devices.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { brokerUrlOf } from './broker-url.ts';
import { presentCredentials, presentDevice } from './presenter.ts';
import * as devices from './service.ts';

const present = (parts: Parts, { device: row, secret }: devices.NewCredentials) =>
  presentCredentials(row, secret, brokerUrlOf(parts.config));

export const deviceRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/devices',
    access: 'session',
    does: 'Lists devices by name, or those of one probe, withdrawn ones included.',
    query: devicesQuery,
    answer: listOf(device),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await devices.listDevices(parts, actor, query);
      return { items: items.map(presentDevice), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/devices',
    access: 'session',
    does: 'Issues credentials for a probe’s device; the password is shown this once.',
    body: issueCredentials,
    answer: issuedCredentials,
    status: 201,
    run: async ({ parts, actor, body }) => present(parts, await devices.issueCredentials(parts, actor, body)),
  }),
  route({
    verb: 'post',
    path: '/api/devices/:id/replace',
    access: 'session',
    does: 'Replaces a device’s password; the new one is shown this once.',
    params: idPath,
    body: replaceCredentials,
    answer: issuedCredentials,
    run: async ({ parts, actor, params, body }) =>
      present(parts, await devices.replaceCredentials(parts, actor, params.id, body.reason)),
  }),
  route({
    verb: 'post',
    path: '/api/devices/:id/revoke',
    access: 'session',
    does: 'Withdraws a device’s credentials; it is disconnected.',
    params: idPath,
    body: revokeCredentials,
    answer: device,
    run: async ({ parts, actor, params, body }) =>
      presentDevice(await devices.revokeCredentials(parts, actor, params.id, body.reason)),
  }),
];

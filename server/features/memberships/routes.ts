import { idPath } from '../../../shared/contracts/common.ts';
import { endMembership, grantRole, membership } from '../../../shared/contracts/memberships.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentMembership } from './presenter.ts';
import * as memberships from './service.ts';

export const membershipRoutes: AnyRoute[] = [
  route({
    verb: 'post',
    path: '/api/memberships',
    access: 'session',
    does: 'Grants a person a role at one site or at all sites.',
    body: grantRole,
    answer: membership,
    status: 201,
    run: async ({ parts, actor, body }) => presentMembership(await memberships.grantRole(parts, actor, body)),
  }),
  route({
    verb: 'post',
    path: '/api/memberships/:id/end',
    access: 'session',
    does: 'Ends a grant at once.',
    params: idPath,
    body: endMembership,
    answer: membership,
    run: async ({ parts, actor, params, body }) =>
      presentMembership(await memberships.endMembership(parts, actor, params.id, body.reason)),
  }),
];

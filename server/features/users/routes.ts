import { z } from 'zod';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import {
  changePassword,
  changeUser,
  createFirstAdministrator,
  createUser,
  deactivateUser,
  setPassword,
  user,
} from '../../../shared/contracts/users.ts';
import { sourceOf } from '../../http/authenticate.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentUser } from './presenter.ts';
import * as users from './service.ts';

const done = z.object({ done: z.literal(true) });

export const userRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/users',
    access: 'session',
    does: 'Lists the people and their roles.',
    answer: listOf(user),
    run: async ({ actor }) => {
      const rows = await users.listUsers(actor);
      return { items: rows.map((row) => presentUser(row, actor)), total: rows.length, nextCursor: null };
    },
  }),
  route({
    verb: 'post',
    path: '/api/users',
    access: 'session',
    does: 'Adds a person and mails a link to set the password.',
    body: createUser,
    answer: user,
    status: 201,
    run: async ({ parts, actor, body }) => presentUser(await users.createUser(parts, actor, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/users/first',
    access: 'public',
    does: 'Creates the first administrator, once.',
    body: createFirstAdministrator,
    answer: done,
    status: 201,
    run: async ({ parts, body, request }) => {
      await users.createFirstAdministrator(parts, body, sourceOf(request));
      return { done: true as const };
    },
  }),
  route({
    verb: 'post',
    path: '/api/users/password-by-link',
    access: 'public',
    does: 'Sets a password by the one-time link of an invitation.',
    body: setPassword,
    run: ({ parts, body, request }) => users.setPasswordByToken(parts, body, sourceOf(request)),
  }),
  route({
    verb: 'post',
    path: '/api/users/me/password',
    access: 'session',
    does: 'Changes one’s own password and signs out everywhere else.',
    body: changePassword,
    run: ({ parts, actor, body, request }) => users.changePassword(parts, actor, request.sessionID, body),
  }),
  route({
    verb: 'get',
    path: '/api/users/:id',
    access: 'session',
    does: 'Shows one person.',
    params: idPath,
    answer: user,
    run: async ({ actor, params }) => presentUser(await users.findUser(actor, params.id), actor),
  }),
  route({
    verb: 'patch',
    path: '/api/users/:id',
    access: 'session',
    does: 'Changes a person’s name or address.',
    params: idPath,
    body: changeUser,
    answer: user,
    run: async ({ parts, actor, params, body }) =>
      presentUser(await users.changeUser(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/users/:id/deactivate',
    access: 'session',
    does: 'Ends a person’s access for good.',
    params: idPath,
    body: deactivateUser,
    answer: user,
    run: async ({ parts, actor, params, body }) =>
      presentUser(await users.deactivateUser(parts, actor, params.id, body), actor),
  }),
  route({
    verb: 'post',
    path: '/api/users/:id/unlock',
    access: 'session',
    does: 'Lifts a sign-in lock.',
    params: idPath,
    answer: user,
    run: async ({ parts, actor, params }) =>
      presentUser(await users.unlockUser(parts, actor, params.id), actor),
  }),
  route({
    verb: 'post',
    path: '/api/users/:id/invite',
    access: 'session',
    does: 'Mails a fresh link to set the password.',
    params: idPath,
    run: ({ parts, actor, params }) => users.inviteAgain(parts, actor, params.id),
  }),
];

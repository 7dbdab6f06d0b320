import { session, signIn, welcome } from '../../../shared/contracts/sessions.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { actorOf, signInRequest, signOutRequest } from '../../http/authenticate.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { grantsWithSites } from '../memberships/service.ts';
import { presentSession } from './presenter.ts';
import { endAllSessions, readWelcome, recordSignOut } from './service.ts';

const describe = async (parts: Parts, actor: Actor, startedAt: string | undefined) =>
  presentSession(
    actor,
    await grantsWithSites(parts, actor.userId),
    startedAt ?? parts.clock.now().toISOString(),
  );

export const sessionRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/sessions/welcome',
    access: 'public',
    does: 'Says what the sign-in page needs before anybody is known.',
    answer: welcome,
    run: () => readWelcome(),
  }),
  route({
    verb: 'post',
    path: '/api/sessions',
    access: 'public',
    does: 'Signs a person in and sets the session cookie.',
    body: signIn,
    answer: session,
    status: 201,
    run: async ({ parts, request }) => {
      await signInRequest(parts, request);
      const actor = await actorOf(parts, request);
      if (!actor) throw new AppError('sessions.credentials-wrong');
      return describe(parts, actor, request.session.startedAt);
    },
  }),
  route({
    verb: 'get',
    path: '/api/sessions/current',
    access: 'session',
    does: 'Says who is signed in and what they may start.',
    answer: session,
    run: ({ parts, actor, request }) => describe(parts, actor, request.session.startedAt),
  }),
  route({
    verb: 'delete',
    path: '/api/sessions/current',
    access: 'session',
    does: 'Signs out here.',
    run: async ({ parts, actor, request, response }) => {
      await recordSignOut(parts, actor);
      await signOutRequest(request);
      response.clearCookie('saltmark.sid');
    },
  }),
  route({
    verb: 'delete',
    path: '/api/sessions',
    access: 'session',
    does: 'Signs out everywhere.',
    run: async ({ parts, actor, request, response }) => {
      await endAllSessions(parts, actor.userId, actor);
      await signOutRequest(request);
      response.clearCookie('saltmark.sid');
    },
  }),
];

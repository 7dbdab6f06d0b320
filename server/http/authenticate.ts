/** Sessions: express-session in PostgreSQL, passport-local, and the actor read fresh on every request. */
import connectPgSimple from 'connect-pg-simple';
import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import passport from 'passport';
import { Strategy as LocalStrategy } from 'passport-local';
import { checkCredentials, findActor } from '../features/sessions/service.ts';
import { openPool } from '../lib/pool.ts';
import type { Parts } from '../parts.ts';
import type { Actor, RequestSource } from './actor.ts';

declare module 'express-session' {
  interface SessionData {
    startedAt?: string;
  }
}
declare module 'express-serve-static-core' {
  interface Request {
    actor?: Actor | null;
    id: string;
  }
}

/** What passport keeps in the session: the id alone, so that rights are never remembered. */
interface SessionUser {
  id: number;
}

/** A working day with its handovers; activity renews it. */
const sessionHours = 12;
const PgStore = connectPgSimple(session);

export interface SessionKit {
  middleware: RequestHandler;
  passport: RequestHandler;
  close: () => Promise<void>;
}

export function createSessions(parts: Parts): SessionKit {
  const pool = openPool({ connectionString: parts.config.databaseUrl, max: 4 }, (error) =>
    parts.log.warn({ err: error }, 'session store connection lost'),
  );
  const store = new PgStore({
    pool,
    tableName: 'sessions',
    createTableIfMissing: false,
    pruneSessionInterval: 15 * 60,
    errorLog: (...lines: unknown[]) => parts.log.warn({ lines }, 'session store'),
  });
  const middleware = session({
    name: 'saltmark.sid',
    store,
    secret: parts.config.sessionSecret,
    resave: false,
    saveUninitialized: false,
    rolling: true,
    cookie: {
      httpOnly: true,
      sameSite: 'lax',
      secure: parts.config.isBehindTls,
      maxAge: sessionHours * 3600 * 1000,
    },
  });
  const authenticator = new passport.Passport();
  authenticator.use(
    new LocalStrategy(
      { usernameField: 'email', passwordField: 'password', passReqToCallback: true },
      (request, email, password, done) => {
        checkCredentials(parts, { email, password }, sourceOf(request)).then(
          (userId) => done(null, { id: userId } satisfies SessionUser),
          (error: unknown) => done(error),
        );
      },
    ),
  );
  authenticator.serializeUser((user, done) => done(null, (user as SessionUser).id));
  authenticator.deserializeUser((id: number, done) => done(null, { id } satisfies SessionUser));
  return {
    middleware,
    passport: compose(authenticator.session() as RequestHandler, (request, _response, next) => {
      // The handshake of a socket has no app behind it, and nobody signs in there.
      const app = request.app as Request['app'] | undefined;
      if (app) app.locals['authenticator'] = authenticator;
      next();
    }),
    close: async () => {
      store.close();
      await pool.end();
    },
  };
}

const compose =
  (first: RequestHandler, second: RequestHandler): RequestHandler =>
  (request, response, next) =>
    first(request, response, (error?: unknown) => (error ? next(error) : second(request, response, next)));

/** Class of the address only: enough to tell the plant network from the street. */
export function sourceOf(request: Request): RequestSource {
  const ip = request.ip ?? '';
  const address = /^(::1|(::ffff:)?127\.)/.test(ip)
    ? 'loopback'
    : /^(::ffff:)?(10\.|192\.168\.|172\.(1[6-9]|2\d|3[01])\.)|^f[cd]/i.test(ip)
      ? 'private'
      : 'public';
  return { address, requestId: request.id };
}

/** The person behind the session with the grants in force now; null when nobody is signed in. */
export async function actorOf(parts: Parts, request: Request): Promise<Actor | null> {
  if (request.actor !== undefined) return request.actor;
  const user = request.user as SessionUser | undefined;
  request.actor = user ? await findActor(parts, user.id, sourceOf(request)) : null;
  return request.actor;
}

/** Checks the password and starts a session under a new id (session fixation: OWASP ASVS 3.2.1). */
export function signInRequest(parts: Parts, request: Request): Promise<number> {
  const authenticator = request.app.locals['authenticator'] as InstanceType<typeof passport.Passport>;
  return new Promise((resolve, reject) => {
    const verify = authenticator.authenticate('local', (error: unknown, user: SessionUser | false) => {
      if (error || !user)
        return reject(error instanceof Error ? error : new Error('No credentials were given.'));
      request.logIn(user, (problem: unknown) => {
        if (problem) return reject(problem as Error);
        request.session.startedAt = parts.clock.now().toISOString();
        delete request.actor;
        resolve(user.id);
      });
    }) as RequestHandler;
    void verify(request, request.res!, (error?: unknown) => reject(error as Error));
  });
}

export function signOutRequest(request: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.destroy((error: unknown) => {
      delete request.actor;
      if (error) reject(error as Error);
      else resolve();
    });
  });
}

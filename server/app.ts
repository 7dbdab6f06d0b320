/** Builds the Express app and mounts every slice; does not listen. */
import { randomUUID } from 'node:crypto';
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import express, { type Express } from 'express';
import helmet from 'helmet';
import { health } from '../shared/contracts/health.ts';
import { AppError } from './errors.ts';
import { allRoutes } from './features/all-routes.ts';
import { errorHandler } from './http/error-handler.ts';
import { refuseForgery } from './http/forgery.ts';
import { serveMetrics, timeRequests } from './http/metrics.ts';
import { mountRoutes } from './http/mount.ts';
import { describeApi } from './http/openapi.ts';
import { limitRequests } from './http/rate-limit.ts';
import { readHealth } from './http/health.ts';
import { route, type AnyRoute } from './http/route.ts';
import type { SessionKit } from './http/authenticate.ts';
import type { Parts } from './parts.ts';

const contentPolicy = (isBehindTls: boolean) => ({
  useDefaults: false,
  directives: {
    defaultSrc: ["'none'"],
    scriptSrc: ["'self'"],
    styleSrc: ["'self'"],
    fontSrc: ["'self'"],
    imgSrc: ["'self'", 'data:', 'blob:'],
    connectSrc: ["'self'", isBehindTls ? 'wss:' : 'ws:'],
    manifestSrc: ["'self'"],
    baseUri: ["'none'"],
    formAction: ["'self'"],
    frameAncestors: ["'none'"],
  },
});

const healthRoute: AnyRoute = route({
  verb: 'get',
  path: '/api/health',
  access: 'public',
  does: 'Says whether database, broker and jobs are up; 503 names what is not.',
  answer: health,
  run: async ({ parts, response }) => {
    const answer = await readHealth(parts);
    if (answer.status !== 'ok') response.status(503);
    return answer;
  },
});

export function buildApp(parts: Parts, sessions: SessionKit): Express {
  const app = express();
  app.disable('x-powered-by');
  if (parts.config.trustProxy) app.set('trust proxy', 1);
  app.use((request, _response, next) => {
    request.id = randomUUID();
    next();
  });
  app.use(timeRequests);
  app.use(
    helmet({
      contentSecurityPolicy: contentPolicy(parts.config.isBehindTls),
      strictTransportSecurity: parts.config.isBehindTls,
      referrerPolicy: { policy: 'same-origin' },
    }),
  );
  app.get('/metrics', serveMetrics(parts.config));
  app.use('/api', (_request, response, next) => {
    response.set('cache-control', 'no-store');
    next();
  });
  app.use('/api', refuseForgery, express.json({ limit: '256kb' }));
  app.post(
    '/api/sessions',
    limitRequests('sessions.too-many', 30, 5, (status) => status >= 400),
  );
  app.use('/api', sessions.middleware, sessions.passport);

  const routes = [healthRoute, ...allRoutes];
  const description = describeApi(routes);
  app.get('/api/openapi.json', (_request, response) => void response.json(description));
  mountRoutes(app, parts, routes);
  app.use('/api', () => {
    throw new AppError('request.not-found');
  });
  serveClient(app, resolve(parts.config.clientDirectory));
  app.use(errorHandler(parts));
  return app;
}

/** The built client: hashed files for a year, the page itself never cached; every other address is the page. */
function serveClient(app: Express, directory: string): void {
  if (!existsSync(directory)) return;
  app.use(
    '/assets',
    express.static(resolve(directory, 'assets'), { immutable: true, maxAge: '1y', fallthrough: false }),
  );
  app.use(express.static(directory, { index: false, maxAge: '1h' }));
  app.get('/{*path}', (request, response, next) => {
    if (!request.accepts('html')) return next(new AppError('request.not-found'));
    response.set('cache-control', 'no-cache').sendFile(resolve(directory, 'index.html'));
  });
}

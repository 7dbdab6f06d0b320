import type { RequestHandler } from 'express';
import { collectDefaultMetrics, Counter, Gauge, Histogram, Registry } from 'prom-client';
import { AppError } from '../errors.ts';
import type { Config } from '../config.ts';

/** One registry per process; ingest, jobs and HTTP count into it. */
export const metrics = new Registry();
collectDefaultMetrics({ register: metrics });

export const readingsStored = new Counter({
  name: 'saltmark_readings_stored_total',
  help: 'Readings committed.',
  registers: [metrics],
});
export const readingsDuplicate = new Counter({
  name: 'saltmark_readings_duplicate_total',
  help: 'Readings seen again and ignored.',
  registers: [metrics],
});
export const messagesQuarantined = new Counter({
  name: 'saltmark_messages_quarantined_total',
  help: 'Messages put into quarantine, by code.',
  labelNames: ['code'] as const,
  registers: [metrics],
});
export const commitSeconds = new Histogram({
  name: 'saltmark_ingest_commit_seconds',
  help: 'Time of one grouped commit.',
  buckets: [0.001, 0.002, 0.005, 0.01, 0.025, 0.05, 0.1, 0.5, 1, 5],
  registers: [metrics],
});
export const devicesConnected = new Gauge({
  name: 'saltmark_devices_connected',
  help: 'Devices connected to the embedded broker.',
  registers: [metrics],
});
export const requestSeconds = new Histogram({
  name: 'saltmark_http_request_seconds',
  help: 'Time to answer an HTTP request, by verb and status.',
  labelNames: ['verb', 'status'] as const,
  registers: [metrics],
});

export const timeRequests: RequestHandler = (request, response, next) => {
  const stop = requestSeconds.startTimer();
  response.once('finish', () => stop({ verb: request.method, status: String(response.statusCode) }));
  next();
};

/** Prometheus text for loopback, or for whoever shows the token. */
export const serveMetrics =
  (config: Config): RequestHandler =>
  async (request, response) => {
    const isLoopback =
      /^(::1|(::ffff:)?127\.)/.test(request.socket.remoteAddress ?? '') && !request.get('x-forwarded-for');
    const hasToken =
      config.metricsToken !== undefined && request.get('authorization') === `Bearer ${config.metricsToken}`;
    if (!isLoopback && !hasToken) throw new AppError('request.not-found');
    response.type(metrics.contentType).send(await metrics.metrics());
  };

/** Starts the parts this process runs, in order, and stops them in the reverse order. */
import { createServer } from 'node:http';
import { buildApp } from './app.ts';
import { readConfig } from './config.ts';
import { connectDatabase } from './db/sequelize.ts';
import { createSessions } from './http/authenticate.ts';
import { databaseHealth } from './http/health.ts';
import { startIngest } from './ingest/start-ingest.ts';
import { startJobs } from './jobs/runner.ts';
import { systemClock } from './lib/clock.ts';
import { createLogger } from './lib/logger.ts';
import type { Parts } from './parts.ts';
import { createBroadcast } from './realtime/broadcast.ts';
import { createRealtimeServer, openGateway } from './realtime/gateway.ts';
import { joinServers } from './realtime/several-servers.ts';

const config = readConfig();
const log = createLogger(config.logLevel);
const stops: { name: string; stop: () => Promise<unknown> }[] = [];
const runs = (part: (typeof config.parts)[number]): boolean => config.parts.includes(part);

async function start(): Promise<void> {
  const sequelize = connectDatabase(config.databaseUrl);
  stops.push({ name: 'database', stop: () => sequelize.close() });
  await sequelize.authenticate();
  const io = createRealtimeServer();
  if (config.redisUrl) stops.push(await joinServers(io, config.redisUrl, log));
  const broadcast = createBroadcast(io);
  const parts: Parts = { config, sequelize, clock: systemClock, log, broadcast, health: [] };
  parts.health.push(databaseHealth(parts));
  if (runs('ingest')) stops.push({ name: 'ingest', ...(await startIngest(parts)) });
  if (runs('jobs')) stops.push({ name: 'jobs', ...(await startJobs(parts)) });
  if (runs('web')) stops.push(await startWeb(parts, io));
  log.info({ port: config.httpPort, parts: config.parts }, 'Saltmark is up');
}

async function startWeb(
  parts: Parts,
  io: ReturnType<typeof createRealtimeServer>,
): Promise<(typeof stops)[number]> {
  const sessions = createSessions(parts);
  const http = createServer(buildApp(parts, sessions));
  openGateway(io, http, parts, sessions);
  await new Promise<void>((resolve, reject) => {
    http.once('error', reject);
    http.listen(config.httpPort, config.bind, resolve);
  });
  const stop = async (): Promise<void> => {
    parts.broadcast.stop();
    await io.close();
    await sessions.close();
  };
  return { name: 'web', stop };
}

let isStopping = false;
async function stopAll(code: number): Promise<void> {
  if (isStopping) return;
  isStopping = true;
  for (const { name, stop } of stops.reverse()) {
    await stop().catch((error: unknown) => log.error({ err: error }, `${name} did not stop cleanly`));
  }
  process.exit(code);
}

process.once('SIGINT', () => void stopAll(0));
process.once('SIGTERM', () => void stopAll(0));
process.on('unhandledRejection', (error) => {
  log.fatal({ err: error }, 'unhandled rejection');
  void stopAll(1);
});

start().catch((error: unknown) => {
  log.fatal({ err: error }, 'Saltmark could not start');
  void stopAll(1);
});

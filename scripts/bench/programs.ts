/** The servers that are measured, each a child process: the load must not share their thread. */
import { spawn, type ChildProcess } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { fileURLToPath } from 'node:url';
import { pause } from './load.ts';

export interface Program {
  mqttUrl: string;
  httpUrl: string;
  /** Processor time of the server so far, s: says more than the clock on a machine that others use. */
  coreSeconds: () => number;
  stop: () => Promise<void>;
}

const file = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

function start(path: string, args: string[], env: NodeJS.ProcessEnv): ChildProcess {
  return spawn(process.execPath, ['--import', 'tsx', file(path), ...args], {
    env,
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });
}

const stopper = (child: ChildProcess) => async (): Promise<void> => {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const ended = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGTERM');
  await ended;
};

/** User and system time of a process: fields 14 and 15 of /proc/PID/stat, in hundredths of a second [proc(5)]. */
function coreSeconds(child: ChildProcess): () => number {
  return () => {
    const fields = readFileSync(`/proc/${child.pid}/stat`, 'utf8').split(') ')[1]!.split(' ');
    return (Number(fields[11]) + Number(fields[12])) / 100;
  };
}

export async function startBare(kind: 'broker' | 'durable', databaseUrl: string): Promise<Program> {
  const child = start('./bare-server.ts', [kind, databaseUrl], process.env);
  const port = await new Promise<number>((resolve, reject) => {
    child.once('message', (told) => resolve((told as { port: number }).port));
    child.once('exit', () => reject(new Error(`The bare ${kind} server did not start.`)));
  });
  return {
    mqttUrl: `mqtt://127.0.0.1:${port}`,
    httpUrl: '',
    coreSeconds: coreSeconds(child),
    stop: stopper(child),
  };
}

/** The product itself, all parts in one process as `npm start` runs it. */
export async function startProduct(databaseUrl: string): Promise<Program> {
  const [httpPort, mqttPort] = await Promise.all([freePort(), freePort()]);
  const httpUrl = `http://127.0.0.1:${httpPort}`;
  const child = start('../../server/main.ts', [], {
    ...process.env,
    DATABASE_URL: databaseUrl,
    PORT: String(httpPort),
    MQTT_PORT: String(mqttPort),
    BIND: '127.0.0.1',
    LOG_LEVEL: 'warn',
  });
  const stop = stopper(child);
  for (let turn = 0; turn < 300; turn += 1) {
    if (child.exitCode !== null) throw new Error('The server ended while starting; its log stands above.');
    const answer = await fetch(`${httpUrl}/api/health`).catch(() => null);
    if (answer?.ok)
      return { mqttUrl: `mqtt://127.0.0.1:${mqttPort}`, httpUrl, coreSeconds: coreSeconds(child), stop };
    await pause(100);
  }
  await stop();
  throw new Error('The server was not healthy within 30 seconds.');
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}

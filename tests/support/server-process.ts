/** The real server as its own process, to be stopped, killed and started again on the same ports and database. */
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { vi } from 'vitest';
import { freePort } from '../../scripts/lib/ports.mjs';
import { root } from './source-files.ts';

export interface ServerProcess {
  url: string;
  mqttUrl: string;
  /** Starts it (again) and waits until every part says that it is up. */
  start: () => Promise<void>;
  /** SIGKILL: no handler runs, nothing is flushed. */
  kill: () => Promise<void>;
  /** SIGTERM, as the start command does. */
  stop: () => Promise<void>;
}

/** A cold start compiles every file; the machine may be busy with other tests. */
const startTimeoutMs = 90_000;
const stopTimeoutMs = 20_000;

const hasEnded = (child: ChildProcess): boolean => child.exitCode !== null || child.signalCode !== null;

/** What a person has set for their own server must not reach this one. */
function environment(more: Record<string, string>): Record<string, string> {
  const { PATH = '', HOME = '', TZ = 'UTC' } = process.env;
  return { PATH, HOME, TZ, LOG_LEVEL: 'warn', SESSION_SECRET: 'only-for-this-test-run', ...more };
}

export async function serverProcess(
  databaseUrl: string,
  more: Record<string, string> = {},
): Promise<ServerProcess> {
  const [port, mqttPort] = [await freePort(), await freePort()];
  const ports = { PORT: String(port), MQTT_PORT: String(mqttPort) };
  const env = environment({ DATABASE_URL: databaseUrl, ...ports, ...more });
  const url = `http://127.0.0.1:${port}`;
  let child: ChildProcess | null = null;
  let output = '';

  const end = async (signal: NodeJS.Signals): Promise<void> => {
    const running = child;
    child = null;
    if (!running || hasEnded(running)) return;
    const ended = once(running, 'exit');
    running.kill(signal);
    const insist = setTimeout(() => running.kill('SIGKILL'), stopTimeoutMs);
    await ended;
    clearTimeout(insist);
  };
  // Whatever ends this worker must not leave a server behind.
  process.once('exit', () => child?.kill('SIGKILL'));

  const isUp = async (): Promise<void> => {
    if (!child || hasEnded(child)) throw new Error(`The server ended while starting.\n${output}`);
    const answer = await fetch(`${url}/api/health`, { signal: AbortSignal.timeout(5000) });
    if (!answer.ok) throw new Error(`The server is not up: ${await answer.text()}\n${output}`);
  };

  return {
    url,
    mqttUrl: `mqtt://127.0.0.1:${mqttPort}`,
    start: async () => {
      output = '';
      child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
        cwd: root,
        env,
        stdio: ['ignore', 'pipe', 'pipe'],
      });
      for (const stream of [child.stdout, child.stderr])
        stream?.on('data', (chunk: Buffer) => (output = (output + chunk.toString()).slice(-4000)));
      await vi.waitFor(isUp, { timeout: startTimeoutMs, interval: 100 });
    },
    kill: () => end('SIGKILL'),
    stop: () => end('SIGTERM'),
  };
}

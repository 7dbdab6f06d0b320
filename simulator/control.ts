/** The door through which a second command reaches the running fleet: one JSON line each way over a local socket. */
import { chmodSync, existsSync, mkdirSync, unlinkSync } from 'node:fs';
import { connect, createServer, type Server } from 'node:net';
import { dirname, relative } from 'node:path';
import type { Deed } from './fleet.ts';

export interface ControlAnswer {
  isDone: boolean;
  text: string;
}

/** Socket paths are limited to about 100 characters; seen from the working directory they are short. */
function shortest(path: string): string {
  const fromHere = relative(process.cwd(), path);
  return fromHere.length < path.length ? fromHere : path;
}

function answerTo(line: string, perform: (deed: Deed) => string): ControlAnswer {
  try {
    return { isDone: true, text: perform(JSON.parse(line) as Deed) };
  } catch (error) {
    return { isDone: false, text: error instanceof Error ? error.message : String(error) };
  }
}

export async function openControl(path: string, perform: (deed: Deed) => string): Promise<Server> {
  mkdirSync(dirname(path), { recursive: true });
  if (existsSync(path)) {
    if (
      await askControl(path, { do: 'list' }).then(
        () => true,
        () => false,
      )
    ) {
      throw new Error(`Another simulator answers at ${path}. Stop it first, or give --control another path.`);
    }
    unlinkSync(path);
  }
  const server = createServer((socket) => {
    let text = '';
    socket.setEncoding('utf8');
    socket.on('error', () => socket.destroy());
    socket.on('data', (chunk: string) => {
      text += chunk;
      const end = text.indexOf('\n');
      if (end >= 0) socket.end(`${JSON.stringify(answerTo(text.slice(0, end), perform))}\n`);
    });
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(shortest(path), resolve);
  });
  chmodSync(path, 0o600);
  return server;
}

export async function askControl(path: string, deed: Deed): Promise<ControlAnswer> {
  return new Promise((resolve, reject) => {
    const socket = connect(shortest(path));
    let text = '';
    socket.setEncoding('utf8');
    socket.on('connect', () => socket.write(`${JSON.stringify(deed)}\n`));
    socket.on('data', (chunk: string) => {
      text += chunk;
    });
    socket.on('error', () =>
      reject(new Error(`No simulator answers at ${path}. Start it first: npm start, or npm run simulate.`)),
    );
    socket.on('end', () => resolve(JSON.parse(text) as ControlAnswer));
  });
}

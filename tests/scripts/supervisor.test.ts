import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { identify, isAlive } from '../../scripts/lib/processes.mjs';

const program = fileURLToPath(new URL('./fixtures/supervised.mjs', import.meta.url));
let folder: string;
let supervised: ChildProcess | undefined;
let output = '';

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'saltmark-supervisor-'));
  output = '';
});

afterEach(() => {
  supervised?.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

/** A child that writes its pid, lives, and writes its name to the order file when asked to end. */
const living = (name: string) => `
  const fs = require('node:fs');
  process.on('SIGTERM', () => { fs.appendFileSync(${JSON.stringify(join(folder, 'order'))}, '${name} '); process.exit(0); });
  setInterval(() => {}, 60000);
  fs.writeFileSync(${JSON.stringify(folder)} + '/${name}.pid', String(process.pid));`;

function start(server: string, beside: string): ChildProcess {
  // A group of its own, so that a signal to the group is a terminal's Ctrl-C.
  const child = spawn(process.execPath, [program, server, beside], {
    detached: true,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (part: Buffer) => (output += part.toString()));
  supervised = child;
  return child;
}

const known = (name: string) =>
  vi.waitFor(() => identify(Number(readFileSync(join(folder, `${name}.pid`), 'utf8') || NaN)), {
    timeout: 10_000,
  });

it.each(['SIGINT', 'SIGTERM'] as const)(
  'stops the server first and then the rest on %s, once',
  async (name) => {
    const child = start(living('server'), living('beside'));
    const children = [await known('server'), await known('beside')];
    process.kill(-(child.pid ?? 0), name);
    // npm passes a terminal's Ctrl-C on a second time.
    process.kill(child.pid ?? 0, name);
    const [code] = (await once(child, 'exit')) as [number];
    expect(code).toBe(0);
    expect(readFileSync(join(folder, 'order'), 'utf8')).toBe('server beside ');
    expect(children.map(isAlive)).toEqual([false, false]);
    expect(output).toContain('Everything that was started has been stopped.');
  },
);

it('stops the rest and says why when a child ends by itself', async () => {
  const server = `
    const fs = require('node:fs');
    const until = setInterval(() => {
      if (!fs.existsSync(${JSON.stringify(folder)} + '/beside.pid')) return;
      console.error('the pump ran dry');
      process.exit(3);
    }, 20);`;
  const child = start(server, living('beside'));
  const beside = await known('beside');
  const [code] = (await once(child, 'exit')) as [number];
  expect(code).toBe(1);
  expect(output).toContain('The server stopped with code 3.');
  expect(output).toContain('the pump ran dry');
  expect(isAlive(beside)).toBe(false);
});

it('leaves other processes alone', async () => {
  const bystander = spawn(process.execPath, ['-e', living('bystander')], { stdio: 'ignore' });
  await known('bystander');
  const child = start(living('server'), living('beside'));
  await known('server');
  await known('beside');
  child.kill('SIGTERM');
  await once(child, 'exit');
  expect(isAlive(identify(bystander.pid ?? 0))).toBe(true);
  bystander.kill('SIGKILL');
});

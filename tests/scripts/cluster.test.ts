import { execFileSync, spawn } from 'node:child_process';
import { once } from 'node:events';
import { chmodSync, mkdirSync, mkdtempSync, rmSync, truncateSync, writeFileSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { runningCluster, startCluster, type Cluster } from '../../scripts/lib/cluster.mjs';
import { createDatabase, databaseExists, dropDatabase, withClient } from '../../scripts/lib/databases.mjs';
import { identify, isAlive, signal, waitForEnd } from '../../scripts/lib/processes.mjs';

let pristine: string;
let dir: string;
let cluster: Cluster | undefined;

function newFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'saltmark-cluster-'));
  chmodSync(folder, 0o755);
  return folder;
}

// Made once; each test gets a copy of its own, owners included.
beforeAll(async () => {
  pristine = newFolder();
  await (await startCluster({ dir: pristine, fsync: false })).stop();
});

afterAll(() => rmSync(pristine, { recursive: true, force: true }));

beforeEach(() => {
  dir = newFolder();
  execFileSync('cp', ['-a', `${pristine}/.`, dir]);
});

afterEach(async () => {
  await cluster?.stop();
  cluster = undefined;
  rmSync(dir, { recursive: true, force: true });
});

async function start(): Promise<Cluster> {
  cluster = await startCluster({ dir, fsync: false });
  return cluster;
}

async function stop(): Promise<void> {
  await cluster?.stop();
  cluster = undefined;
}

const ask = (url: string, sql: string) =>
  withClient(url, async (client) => (await client.query(sql)).rows as Record<string, unknown>[]);

const keepOneRow = 'create table kept (a integer); insert into kept values (42)';

/** A process of its own that starts the cluster in `dir` and holds it. */
async function holdElsewhere() {
  const program = fileURLToPath(new URL('./fixtures/hold-cluster.mjs', import.meta.url));
  const holder = spawn(process.execPath, [program, dir], { stdio: ['ignore', 'pipe', 'inherit'] });
  const [line] = (await once(createInterface({ input: holder.stdout }), 'line')) as [string];
  return { holder, ...(JSON.parse(line) as { pid: number; ownerUrl: string }) };
}

describe('a private cluster', () => {
  it('keeps data, port and passwords over a stop and a start', async () => {
    const first = await start();
    await ask(first.ownerUrl, keepOneRow);
    expect(statSync(join(dir, 'cluster.json')).mode & 0o777).toBe(0o600);
    await stop();

    const second = await start();
    expect(second.ownerUrl).toBe(first.ownerUrl);
    expect(await ask(second.ownerUrl, 'select a from kept')).toEqual([{ a: 42 }]);
  });

  it('gives the application a role that owns nothing, and refuses a wrong password', async () => {
    const { appUrl, superuserUrl } = await start();
    await expect(ask(appUrl, 'create table mine (a integer)')).rejects.toMatchObject({ code: '42501' });
    await expect(ask(appUrl, 'create role intruder')).rejects.toMatchObject({ code: '42501' });
    const rows = await ask(
      superuserUrl,
      `select d.datname, o.rolname from pg_database d join pg_roles o on o.oid = d.datdba where datname = 'saltmark'`,
    );
    expect(rows).toEqual([{ datname: 'saltmark', rolname: 'saltmark_owner' }]);

    const wrong = new URL(appUrl);
    wrong.password = 'salt';
    await expect(ask(wrong.href, 'select 1')).rejects.toMatchObject({ code: '28P01' });
  });

  it('listens on loopback only, and on no socket file', async () => {
    const { superuserUrl } = await start();
    expect(await ask(superuserUrl, 'show listen_addresses')).toEqual([{ listen_addresses: '127.0.0.1' }]);
    expect(await ask(superuserUrl, 'show unix_socket_directories')).toEqual([
      { unix_socket_directories: '' },
    ]);
  });

  it('clones databases from a template and drops them with people still connected', async () => {
    const urls = await start();
    const template = await createDatabase(urls, 'a_template');
    await ask(template.ownerUrl, keepOneRow);
    const clone = await createDatabase(urls, 'a_clone', { template: 'a_template' });
    expect(await ask(clone.ownerUrl, 'select a from kept')).toEqual([{ a: 42 }]);
    await dropDatabase(urls, 'a_clone');
    expect(await databaseExists(urls, 'a_clone')).toBe(false);
  });

  it('refuses a second start from the same folder with one sentence, and the first goes on', async () => {
    const { ownerUrl } = await start();
    await expect(startCluster({ dir })).rejects.toMatchObject({
      name: 'Refusal',
      message: `The database in ${dir} is already running, started by process ${process.pid}.`,
      wayOut: expect.stringContaining('stop it first') as string,
    });
    expect(await ask(ownerUrl, 'select 1 as one')).toEqual([{ one: 1 }]);
    expect(runningCluster(dir)?.ownerUrl).toBe(ownerUrl);
    await stop();
    expect(runningCluster(dir)).toBeUndefined();
  });

  it('starts again after its holder was killed, ending the server that was left over', async () => {
    const { holder, pid, ownerUrl } = await holdElsewhere();
    await ask(ownerUrl, keepOneRow);
    const leftOver = identify(pid);
    holder.kill('SIGKILL');
    await once(holder, 'exit');
    expect(isAlive(leftOver)).toBe(true);

    const again = await start();
    expect(isAlive(leftOver)).toBe(false);
    expect(await ask(again.ownerUrl, 'select a from kept')).toEqual([{ a: 42 }]);
  });

  it('starts again after holder and server were both killed', async () => {
    const { holder, pid, ownerUrl } = await holdElsewhere();
    await ask(ownerUrl, keepOneRow);
    const server = identify(pid);
    holder.kill('SIGKILL');
    signal(pid, 'SIGKILL');
    expect(await waitForEnd(server, 10_000)).toBe(true);

    const again = await start();
    expect(await ask(again.ownerUrl, 'select a from kept')).toEqual([{ a: 42 }]);
  });

  it('is not misled by a postmaster.pid that names another living program', async () => {
    await start();
    await stop();
    writeFileSync(join(dir, 'data/postmaster.pid'), `${process.pid}\n${join(dir, 'data')}\n`);
    const again = await start();
    expect(await ask(again.ownerUrl, 'select 1 as one')).toEqual([{ one: 1 }]);
  });
});

describe('a broken cluster', () => {
  it('begins again where making it was interrupted', async () => {
    rmSync(dir, { recursive: true });
    mkdirSync(join(dir, 'data.new/base'), { recursive: true });
    writeFileSync(join(dir, 'data.new/PG_VERSION'), '15\n');
    chmodSync(dir, 0o755);
    const { ownerUrl } = await start();
    expect(await ask(ownerUrl, 'select 1 as one')).toEqual([{ one: 1 }]);
  });

  const broken = [
    {
      what: 'a cut control file',
      harm: () => truncateSync(join(dir, 'data/global/pg_control'), 100),
      says: 'is damaged',
    },
    {
      what: 'a missing folder',
      harm: () => rmSync(join(dir, 'data/pg_wal'), { recursive: true }),
      says: 'is damaged',
    },
    {
      what: 'another version',
      harm: () => writeFileSync(join(dir, 'data/PG_VERSION'), '9.6\n'),
      says: 'was made by PostgreSQL 9',
    },
    {
      what: 'lost passwords',
      harm: () => rmSync(join(dir, 'cluster.json')),
      says: 'is missing or cannot be read',
    },
  ];

  it.each(broken)(
    'tells $what in one sentence with a way out, and deletes nothing',
    async ({ harm, says }) => {
      await start();
      await stop();
      harm();
      await expect(start()).rejects.toMatchObject({
        name: 'Refusal',
        message: expect.stringContaining(says) as string,
        wayOut: expect.stringContaining(`mv ${join(dir, 'data')} ${join(dir, 'data')}.broken`) as string,
      });
      expect(statSync(join(dir, 'data/base')).isDirectory()).toBe(true);
      expect(runningCluster(dir)).toBeUndefined();
    },
  );
});

import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { once } from 'node:events';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { installScript } from '../../scripts/lib/debian-packages.mjs';
import { requireFreeSpace } from '../../scripts/lib/disk-space.mjs';
import { areInstalled, requireNode } from '../../scripts/lib/npm-packages.mjs';
import { freePort, isPortFree, portFrom, requirePort } from '../../scripts/lib/ports.mjs';
import { holderOf, takeLock } from '../../scripts/lib/run-lock.mjs';
import { closingLine, countTests, readReport } from '../../scripts/lib/test-report.mjs';

describe('ports', () => {
  it('tells a port in use with the variable that moves it', async () => {
    const other = createServer().listen(0, '127.0.0.1');
    await once(other, 'listening');
    const { port } = other.address() as AddressInfo;
    await expect(requirePort('MQTT_PORT', port, 'the probes (MQTT)', '127.0.0.1')).rejects.toMatchObject({
      message: `Port ${port}, which Saltmark needs for the probes (MQTT), is in use by another program.`,
      wayOut: expect.stringContaining(`MQTT_PORT=${port + 100} npm start`) as string,
    });
    other.close();
    await once(other, 'close');
    expect(await isPortFree(port)).toBe(true);
  });

  it('finds a free one, and refuses what is not a port', async () => {
    expect(await isPortFree(await freePort())).toBe(true);
    expect(portFrom('PORT', 4280, {})).toBe(4280);
    expect(portFrom('PORT', 4280, { PORT: '5000' })).toBe(5000);
    for (const PORT of ['http', '0', '70000', '42.5']) {
      expect(() => portFrom('PORT', 4280, { PORT })).toThrow(`PORT is “${PORT}”, which is not a port.`);
    }
  });
});

describe('before anything is installed', () => {
  it('refuses an older Node and a nearly full disk with the figures', () => {
    expect(() => requireNode('18.20.4')).toThrow('Saltmark needs Node 20.19 or newer, and this is 18.20.4.');
    expect(() => requireNode('20.18.9')).toThrow('20.18.9');
    expect(() => requireNode('22.0.0')).not.toThrow();
    expect(() => requireFreeSpace('/', { free: 120 })).toThrow('120 MB are free and Saltmark needs 500 MB');
    expect(() => requireFreeSpace('/', { free: 500 })).not.toThrow();
  });

  it('sees missing, older and interrupted npm installs', () => {
    const wanted = {
      '': {},
      'node_modules/a': { version: '1.0.0' },
      'node_modules/b': { version: '2.0.0', optional: true },
    };
    expect(areInstalled(wanted, undefined)).toBe(false);
    expect(areInstalled(wanted, {})).toBe(false);
    expect(areInstalled(wanted, { 'node_modules/a': { version: '0.9.0' } })).toBe(false);
    expect(areInstalled(wanted, { 'node_modules/a': { version: '1.0.0' } })).toBe(true);
  });

  it('keeps Debian from making a cluster of its own, and takes its own mark away again', () => {
    const script = installScript(['postgresql', 'chromium']);
    expect(script.indexOf('install postgresql-common')).toBeLessThan(
      script.indexOf('create_main_cluster = false'),
    );
    expect(script.indexOf('create_main_cluster = false')).toBeLessThan(
      script.indexOf('install postgresql chromium'),
    );
    expect(script).toContain('trap');
    expect(installScript(['chromium'])).not.toContain('createcluster');
  });
});

describe('the run lock', () => {
  let folder: string;
  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), 'saltmark-lock-'));
  });
  afterEach(() => rmSync(folder, { recursive: true, force: true }));

  it('is held by one living process, and free again after release', async () => {
    const file = join(folder, 'running.json');
    const { lock } = await takeLock(file, { address: 'http://127.0.0.1:4280' });
    expect((await takeLock(file)).takenBy).toMatchObject({
      holder: { pid: process.pid },
      address: 'http://127.0.0.1:4280',
    });
    lock?.release();
    expect(holderOf(file)).toBeUndefined();
    expect((await takeLock(file)).lock).toBeDefined();
  });

  it('does not take a later process with the same pid for the holder, nor for a child to be ended', async () => {
    const file = join(folder, 'running.json');
    const another = { pid: process.pid, bornAt: '1' };
    writeFileSync(file, JSON.stringify({ holder: another, children: [another] }));
    const { lock, takenBy } = await takeLock(file);
    expect(takenBy).toBeUndefined();
    expect(lock).toBeDefined();
  });

  it('survives a file cut in the middle by a full disk', async () => {
    const file = join(folder, 'running.json');
    writeFileSync(file, '{"holder": {"pi');
    expect((await takeLock(file)).lock).toBeDefined();
  });
});

describe('the closing line of the tests', () => {
  const passed = { status: 'passed', assertionResults: [{ status: 'passed' }] };

  it('says what was counted', () => {
    const report = { numPassedTests: 12, numFailedTests: 0, testResults: [passed] };
    expect(closingLine(countTests(report, 0))).toBe('12 passed, 0 failed');
  });

  it('counts failed tests, and a file that broke before its first test as one', () => {
    const testResults = [
      passed,
      { status: 'failed', assertionResults: [{ status: 'failed' }, { status: 'failed' }] },
      { status: 'failed', assertionResults: [] },
    ];
    expect(closingLine(countTests({ numPassedTests: 1, numFailedTests: 2, testResults }, 1))).toBe(
      '1 passed, 3 failed',
    );
  });

  it.each([
    ['a crash without a report', undefined, 1, '0 passed, 1 failed'],
    ['no test found', { numPassedTests: 0, numFailedTests: 0, testResults: [] }, 0, '0 passed, 1 failed'],
    [
      'an error outside any test',
      { numPassedTests: 7, numFailedTests: 0, testResults: [passed] },
      1,
      '7 passed, 1 failed',
    ],
  ])('never calls %s a success', (_, report, code, line) => {
    expect(closingLine(countTests(report, code))).toBe(line);
  });

  it('answers nothing for a report that was never written', () => {
    expect(readReport('/nowhere/report.json')).toBeUndefined();
  });
});

// `npm test`: every test, in a database cluster of its own; what follows `--` goes to vitest as filters.
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { ensureClientBuilt } from './lib/client-build.mjs';
import { run } from './lib/commands.mjs';
import { findChromium } from './lib/debian-packages.mjs';
import { ensurePackages } from './lib/packages.mjs';
import { say, step, tellFailure } from './lib/say.mjs';
import { supervise } from './lib/supervisor.mjs';
import { startTemporaryCluster } from './lib/temporary-cluster.mjs';
import { closingLine, countTests, readReport } from './lib/test-report.mjs';

const outcome = { passed: 0, failed: 1 };

/** What a person has set for `npm start` must not reach the tests. */
function testEnvironment({ superuserUrl, ownerUrl, appUrl }) {
  const theirs = [
    'PORT',
    'MQTT_PORT',
    'BIND',
    'DATABASE_URL',
    'MIGRATIONS_DATABASE_URL',
    'MQTT_URL',
    'REDIS_URL',
    'SMTP_URL',
  ];
  const more = ['MAIL_FROM', 'SESSION_SECRET', 'DEMO', 'ROLES', 'SIMULATE', 'PUBLIC_URL', 'NODE_ENV'];
  const env = { ...process.env };
  for (const name of [...theirs, ...more]) delete env[name];
  return {
    ...env,
    SALTMARK_TEST_CLUSTER: JSON.stringify({ superuserUrl, ownerUrl, appUrl }),
    SALTMARK_TEST_CHROMIUM: findChromium() ?? '',
  };
}

async function test(supervisor) {
  const onStart = (child) => supervisor.onStart(child);
  await ensurePackages({ debian: ['postgresql', 'chromium', 'poppler-utils'], onStart });
  supervisor.check();
  const cluster = await step('Starting a database for the tests', () =>
    startTemporaryCluster(supervisor, { parent: tmpdir(), prefix: 'saltmark-tests-', fsync: false }),
  );
  const filters = process.argv.slice(2);
  if (mayIncludeJourneys(filters)) await ensureClientBuilt({ onStart });
  supervisor.check();

  const reports = mkdtempSync(join(tmpdir(), 'saltmark-report-'));
  const report = join(reports, 'report.json');
  try {
    const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
    const vitest = [
      'node_modules/vitest/vitest.mjs',
      'run',
      '--config',
      'tests/vitest.config.ts',
      ...reporters,
    ];
    const env = testEnvironment(cluster);
    const code = await run(process.execPath, [...vitest, ...filters], { env, onStart, detached: true });
    Object.assign(outcome, countTests(readReport(report), code));
  } finally {
    rmSync(reports, { recursive: true, force: true });
  }
}

/** Pages are needed only by the browser's tests; a narrower choice need not wait for a build. */
const mayIncludeJourneys = (filters) =>
  filters.length === 0 || filters.some((filter) => filter.startsWith('-') || filter.includes('journeys'));

try {
  await supervise(test, { untilDone: true });
} catch (error) {
  tellFailure(error);
}
say(closingLine(outcome));
process.exitCode = outcome.failed > 0 ? 1 : 0;

/** What every command stands on: one at a time, packages, a database that is up to date, and its data. */
import { rmSync } from 'node:fs';
import { join, relative } from 'node:path';
import { startCluster } from './cluster.mjs';
import { typescript } from './commands.mjs';
import { demoState, hasNoUsers, loadDemo, recreateDatabase } from './demo-data.mjs';
import { ownerEnvironment } from './environment.mjs';
import { logsFolder, makeDataFolder, postgresFolder, root, runLockFile } from './paths.mjs';
import { takeLock } from './run-lock.mjs';
import { Refusal, step } from './say.mjs';

/** Refuses while another command of this clone runs; ends what a crashed one has left. */
export async function claimClone(supervisor, { address, what = 'Saltmark' } = {}) {
  makeDataFolder();
  const { lock, takenBy } = await takeLock(runLockFile, { address, what });
  if (takenBy) {
    const where = takenBy.address ? ` at ${takenBy.address}` : '';
    throw new Refusal(
      `${takenBy.what ?? 'Saltmark'} is already running from this folder${where}, as process ${takenBy.holder?.pid ?? 'unknown'}.`,
      'Use that one, or stop it first: Ctrl-C in its terminal.',
    );
  }
  supervisor.useLock(lock);
}

/** The private cluster, or the database that DATABASE_URL names: then nothing is started here. */
export async function openDatabase(supervisor, settings) {
  if (settings.outsideDatabase) {
    const url = settings.outsideDatabase;
    return { urls: { appUrl: url, ownerUrl: process.env.MIGRATIONS_DATABASE_URL || url } };
  }
  const log = join(logsFolder, 'postgres.log');
  const cluster = await step('Starting the database', () => startCluster({ dir: postgresFolder, log }));
  supervisor.adopt({
    title: 'The database',
    log,
    exited: cluster.exited,
    stop: cluster.stop,
    pid: cluster.pid,
    forceSignal: 'SIGQUIT',
  });
  supervisor.check();
  return { urls: cluster, cluster };
}

const newerDatabase = (details) =>
  new Refusal(
    'The database was made by a newer Saltmark than this one.',
    'Use that version again (git pull), or drop the data and begin afresh: npm run reset.',
    { details },
  );

export async function migrate(supervisor, env) {
  const log = join(logsFolder, 'migrate.log');
  rmSync(log, { force: true });
  const run = () =>
    supervisor.run(typescript('scripts/migrate.ts'), {
      env,
      log,
      failure: 'The database could not be brought up to date.',
      wayOut: `See ${relative(root, log)}; nothing was half done, so it is safe to start again.`,
    });
  try {
    await step('Bringing the database up to date', run);
  } catch (error) {
    if (error.details?.some((line) => line.includes('this release does not know')))
      throw newerDatabase(error.details);
    throw error;
  }
}

/** Migrations, and the demo into a database that is new. Answers whether the demo is there. */
export async function prepareDatabase(supervisor, settings, { urls, cluster }) {
  const env = ownerEnvironment(settings, urls);
  // A load that was interrupted has left a part: begin again.
  if (cluster && demoState(cluster) === 'loading') await recreateDatabase(cluster);
  await migrate(supervisor, env);
  if (!cluster) {
    if (settings.asksForDemo && (await hasNoUsers(urls.appUrl))) await loadDemo(supervisor, env);
    return { hasDemo: settings.asksForDemo };
  }
  const state = demoState(cluster);
  if (state === 'loaded' || state === 'none') return { hasDemo: state === 'loaded' };
  if (!settings.wantsDemo) {
    cluster.remember({ demo: 'none' });
    return { hasDemo: false };
  }
  cluster.remember({ demo: 'loading' });
  await loadDemo(supervisor, env);
  cluster.remember({ demo: 'loaded' });
  return { hasDemo: true };
}

/** The demo: loaded once, into a database that is new. What happened is remembered beside the database's files. */
import { rmSync } from 'node:fs';
import { createDatabase, dropDatabase, withClient } from './databases.mjs';
import { database } from './cluster-setup.mjs';
import { typescript } from './commands.mjs';
import { simulatorFile, simulatorStateFile } from './paths.mjs';
import { step } from './say.mjs';

/** `loaded` · `loading` (interrupted) · `none` (the owner chose an empty one) · undefined (a new database). */
export const demoState = (cluster) => cluster.remembered.demo;

export async function recreateDatabase(cluster) {
  const asMaintenance = { ...cluster, superuserUrl: cluster.maintenanceUrl };
  await dropDatabase(asMaintenance, database);
  await createDatabase(asMaintenance, database);
  // The simulated probes of before must not go on counting into a database that never saw them.
  for (const file of [simulatorFile, simulatorStateFile]) rmSync(file, { force: true });
}

export const loadDemo = (supervisor, env) =>
  step('Loading the demo: four sites with two years of history', () =>
    supervisor.run(typescript('scripts/load-demo.ts'), {
      env,
      failure: 'The demo could not be loaded.',
      wayOut: 'What it printed above says why. Start again to retry, or start without it: DEMO=0 npm start.',
    }),
  );

/** True when there is no user yet in somebody else's database, so that DEMO=1 may fill it. */
export const hasNoUsers = (url) =>
  withClient(url, async (client) => {
    const { rows } = await client.query('select not exists (select 1 from users) as is_empty');
    return rows[0].is_empty;
  });

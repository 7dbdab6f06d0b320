// `npm run bench`: measures ingest and live updates on this machine, against a cluster that really writes to disk.
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { run, typescript } from './lib/commands.mjs';
import { createDatabase } from './lib/databases.mjs';
import { migrate } from './lib/foundation.mjs';
import { ownerEnvironment, readSettings } from './lib/environment.mjs';
import { ensurePackages } from './lib/packages.mjs';
import { dataFolder, root } from './lib/paths.mjs';
import { Refusal, runEntryPoint, step } from './lib/say.mjs';
import { supervise } from './lib/supervisor.mjs';
import { startTemporaryCluster } from './lib/temporary-cluster.mjs';

const PROGRAM = 'scripts/bench/main.ts';

async function bench(supervisor) {
  const onStart = (child) => supervisor.onStart(child);
  if (!existsSync(join(root, PROGRAM)))
    throw new Refusal(`There is no benchmark: ${PROGRAM} is missing.`, 'Restore it with git.');
  await ensurePackages({ debian: ['postgresql'], onStart });
  supervisor.check();
  // On the disk of the clone, not in /tmp: that may be memory, which would flatter every figure.
  const cluster = await step('Starting a database for the benchmark', () =>
    startTemporaryCluster(supervisor, { parent: dataFolder, prefix: 'bench-', fsync: true }),
  );
  const settings = readSettings({});
  await migrate(supervisor, ownerEnvironment(settings, cluster));
  const bare = await createDatabase(cluster, 'saltmark_bare');
  const env = {
    ...ownerEnvironment(settings, cluster),
    SALTMARK_BENCH: JSON.stringify({
      appUrl: cluster.appUrl,
      ownerUrl: cluster.ownerUrl,
      superuserUrl: cluster.superuserUrl,
      bareOwnerUrl: bare.ownerUrl,
    }),
  };
  const code = await run(process.execPath, typescript(PROGRAM, ...process.argv.slice(2)), {
    env,
    onStart,
    detached: true,
  });
  supervisor.check();
  return code;
}

await runEntryPoint(() => supervise(bench, { untilDone: true }));

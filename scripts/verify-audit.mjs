// `npm run verify-audit`: checks the audit trail's chain, with Saltmark running or not, and changes nothing.
import { runningCluster } from './lib/cluster.mjs';
import { run, typescript } from './lib/commands.mjs';
import { readSettings, serverEnvironment } from './lib/environment.mjs';
import { claimClone, openDatabase } from './lib/foundation.mjs';
import { ensurePackages } from './lib/packages.mjs';
import { postgresFolder } from './lib/paths.mjs';
import { runEntryPoint } from './lib/say.mjs';
import { supervise } from './lib/supervisor.mjs';

/** A running Saltmark's database is used as it is; otherwise the cluster is started for the time of the check. */
async function findDatabase(supervisor, settings) {
  const running = settings.outsideDatabase ? undefined : runningCluster(postgresFolder);
  if (running) return running;
  if (!settings.outsideDatabase) await claimClone(supervisor, { what: 'A check of the audit trail' });
  return (await openDatabase(supervisor, settings)).urls;
}

async function verifyAudit(supervisor) {
  const settings = readSettings();
  const onStart = (child) => supervisor.onStart(child);
  await ensurePackages({ debian: settings.outsideDatabase ? [] : ['postgresql'], onStart });
  supervisor.check();
  const urls = await findDatabase(supervisor, settings);
  const args = typescript('scripts/verify-audit.ts', ...process.argv.slice(2));
  const code = await run(process.execPath, args, {
    env: serverEnvironment(settings, urls),
    onStart,
    detached: true,
  });
  supervisor.check();
  return code;
}

await runEntryPoint(() => supervise(verifyAudit, { untilDone: true }));

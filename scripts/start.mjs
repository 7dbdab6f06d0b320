// `npm start`: from a fresh clone to a living fleet, and the second time in seconds.
import { ensureClientBuilt } from './lib/client-build.mjs';
import { readSettings } from './lib/environment.mjs';
import { claimClone, openDatabase, prepareDatabase } from './lib/foundation.mjs';
import { ensurePackages } from './lib/packages.mjs';
import { runEntryPoint } from './lib/say.mjs';
import { requirePorts, startServer, startSimulator, tellWhereItIs, waitForHealth } from './lib/stack.mjs';
import { supervise } from './lib/supervisor.mjs';

async function start(supervisor) {
  const settings = readSettings();
  const onStart = (child) => supervisor.onStart(child);
  await claimClone(supervisor, { address: settings.address });
  await requirePorts(settings);
  await ensurePackages({ debian: settings.outsideDatabase ? [] : ['postgresql'], onStart });
  supervisor.check();

  const opened = await openDatabase(supervisor, settings);
  const { hasDemo } = await prepareDatabase(supervisor, settings, opened);
  if (settings.servesWeb) await ensureClientBuilt({ onStart });
  supervisor.check();

  startServer(supervisor, settings, opened.urls);
  await waitForHealth(supervisor, settings);
  const simulates = startSimulator(supervisor, settings, { hasDemo });
  tellWhereItIs(settings, { hasDemo, simulates });
}

await runEntryPoint(() => supervise(start));

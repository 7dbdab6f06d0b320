// `npm run dev`: the same as start, with the server restarted and the pages reloaded at every change.
import { join } from 'node:path';
import { portFrom, requirePort } from './lib/ports.mjs';
import { readSettings } from './lib/environment.mjs';
import { claimClone, openDatabase, prepareDatabase } from './lib/foundation.mjs';
import { ensurePackages } from './lib/packages.mjs';
import { root } from './lib/paths.mjs';
import { runEntryPoint } from './lib/say.mjs';
import { requirePorts, startServer, startSimulator, tellWhereItIs, waitForHealth } from './lib/stack.mjs';
import { stopOrder, supervise } from './lib/supervisor.mjs';

async function develop(supervisor) {
  const settings = readSettings();
  const pagesPort = portFrom('CLIENT_PORT', settings.port + 1);
  const onStart = (child) => supervisor.onStart(child);
  await claimClone(supervisor, { address: `http://127.0.0.1:${pagesPort}` });
  await requirePorts(settings);
  await requirePort('CLIENT_PORT', pagesPort, 'the pages under development');
  await ensurePackages({ debian: settings.outsideDatabase ? [] : ['postgresql'], onStart });
  supervisor.check();

  const opened = await openDatabase(supervisor, settings);
  const { hasDemo } = await prepareDatabase(supervisor, settings, opened);
  supervisor.check();
  const tsx = join(root, 'node_modules/tsx/dist/cli.mjs');
  startServer(supervisor, settings, opened.urls, {
    args: [tsx, 'watch', '--clear-screen=false', 'server/main.ts'],
    env: { NODE_ENV: process.env.NODE_ENV || 'development' },
    echo: true,
  });
  supervisor.start({
    name: 'client-dev-server',
    title: 'The development server for the pages',
    args: ['scripts/lib/client-dev-server.mjs', String(pagesPort), settings.address],
    env: process.env,
    order: stopOrder.beside,
    echo: true,
  });
  await waitForHealth(supervisor, settings);
  const simulates = startSimulator(supervisor, settings, { hasDemo });
  tellWhereItIs(settings, { hasDemo, simulates, address: `http://127.0.0.1:${pagesPort}` });
}

await runEntryPoint(() => supervise(develop));

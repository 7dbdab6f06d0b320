/** The running product: server and simulator as children, and the box that says where it is. */
import { existsSync } from 'node:fs';
import { setTimeout as delay } from 'node:timers/promises';
import { typescript } from './commands.mjs';
import { serverEnvironment } from './environment.mjs';
import { simulatorFile } from './paths.mjs';
import { requirePort } from './ports.mjs';
import { box, Refusal } from './say.mjs';
import { stopOrder } from './supervisor.mjs';

const HEALTH_TIMEOUT_MS = 90_000;

/** Before anything is started: a port in use is told at once. */
export async function requirePorts(settings) {
  if (settings.port === settings.mqttPort) {
    throw new Refusal(`PORT and MQTT_PORT are both ${settings.port}.`, 'Give them different numbers.');
  }
  if (settings.servesWeb) await requirePort('PORT', settings.port, 'the pages', settings.bind);
  if (settings.ingests && !settings.outsideBroker) {
    await requirePort('MQTT_PORT', settings.mqttPort, 'the probes (MQTT)', settings.bind);
  }
}

export function startServer(
  supervisor,
  settings,
  urls,
  { args = typescript('server/main.ts'), env = {}, echo } = {},
) {
  supervisor.start({
    name: 'server',
    title: 'The server',
    args,
    env: { ...serverEnvironment(settings, urls), ...env },
    order: stopOrder.server,
    echo,
  });
}

/**
 * The demo's probes, when the demo is there and nobody asked for silence. Their readings go without the flag
 * `simulated`: the points they stand at are imaginary too, and a real point never believes a simulated value.
 */
export function startSimulator(supervisor, settings, { hasDemo }) {
  if (!hasDemo || !settings.simulates || !settings.ingests || !existsSync(simulatorFile)) return false;
  const broker = settings.outsideBroker ?? `mqtt://${settings.shownHost}:${settings.mqttPort}`;
  supervisor.start({
    name: 'simulator',
    title: 'The simulator',
    args: typescript('simulator/main.ts', '--credentials', simulatorFile, '--url', broker, '--unmarked'),
    env: process.env,
    order: stopOrder.beside,
  });
  return true;
}

async function isHealthy(address) {
  try {
    const answer = await fetch(`${address}/api/health`, { signal: AbortSignal.timeout(5_000) });
    const body = await answer.text();
    return { healthy: answer.ok, body };
  } catch {
    return { healthy: false, body: '' };
  }
}

/** Waits until the server says that all its parts are up; a server that ends meanwhile is told by its supervisor. */
export async function waitForHealth(supervisor, { address, servesWeb }) {
  if (!servesWeb) return;
  const deadline = Date.now() + HEALTH_TIMEOUT_MS;
  for (;;) {
    supervisor.check();
    const { healthy, body } = await Promise.race([isHealthy(address), supervisor.ended.then(() => ({}))]);
    if (healthy) return;
    if (Date.now() > deadline) {
      throw new Refusal(
        `The server did not become ready in ${HEALTH_TIMEOUT_MS / 1000} s.`,
        'See .data/logs/server.log.',
        {
          details: body ? [body.slice(0, 300)] : [],
        },
      );
    }
    await delay(100);
  }
}

const signIns = [
  ['technician@corrie.example', 'checks, calibrates and moves probes at Corrie'],
  ['manager@corrie.example', 'plans, reviews and approves the work'],
  ['operator@corrie.example', 'watches live readings and says what looks wrong'],
  ['auditor@corrie.example', 'reads everything, changes nothing, until a date'],
  ['administrator@corrie.example', 'people, rights, devices, settings'],
];

export function tellWhereItIs(settings, { hasDemo, simulates, address = settings.address }) {
  const lines = [`Saltmark is running at  ${address}`, ''];
  if (hasDemo) {
    lines.push('Sign in with the password  salt-mark-demo  as');
    for (const [name, can] of signIns) lines.push(`  ${name.padEnd(30)}${can}`);
  } else {
    lines.push('The first visitor who opens it on an empty database creates the administrator.');
  }
  lines.push('');
  lines.push(
    settings.smtpUrl ? 'Mail is sent through  SMTP_URL' : `Mail it would send: ${address}/settings/mail`,
  );
  lines.push(
    `Probes connect to   ${settings.outsideBroker ?? `mqtt://${settings.shownHost}:${settings.mqttPort}`}`,
  );
  if (simulates) lines.push('Simulated probes are sending now; real ones may join them.');
  lines.push('Logs are in         .data/logs', '', 'Ctrl-C stops everything that was started.');
  box(lines);
}

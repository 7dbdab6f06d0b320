/** The environment that our own programs are given. */
import { randomBytes } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { dataFolder } from './paths.mjs';
import { portFrom } from './ports.mjs';
import { Refusal } from './say.mjs';

/** Made once, so that people stay signed in over a restart. */
export function sessionSecret(file = join(dataFolder, 'session-secret')) {
  try {
    const kept = readFileSync(file, 'utf8').trim();
    if (kept.length >= 32) return kept;
  } catch (error) {
    if (error.code !== 'ENOENT') throw error;
  }
  const made = randomBytes(32).toString('base64url');
  writeFileSync(file, `${made}\n`, { mode: 0o600 });
  return made;
}

function flag(name, fallback, env) {
  const value = env[name] || fallback;
  if (value === '0' || value === '1') return value === '1';
  throw new Refusal(`${name} is “${value}”.`, `Set ${name} to 1 or 0, or leave it out (${fallback}).`);
}

/** What the commands themselves need to know of the environment. */
export function readSettings(env = process.env) {
  const parts = (env.ROLES || 'web,ingest,jobs').split(',').map((name) => name.trim());
  const bind = env.BIND || '127.0.0.1';
  const port = portFrom('PORT', 4280, env);
  const shown = bind === '0.0.0.0' || bind === '::' ? '127.0.0.1' : bind;
  return {
    bind,
    port,
    mqttPort: portFrom('MQTT_PORT', 4283, env),
    address: `http://${shown.includes(':') ? `[${shown}]` : shown}:${port}`,
    shownHost: shown,
    outsideDatabase: env.DATABASE_URL || undefined,
    outsideBroker: env.MQTT_URL || undefined,
    smtpUrl: env.SMTP_URL || undefined,
    wantsDemo: flag('DEMO', '1', env),
    asksForDemo: env.DEMO === '1',
    simulates: flag('SIMULATE', '1', env),
    servesWeb: parts.includes('web'),
    ingests: parts.includes('ingest'),
  };
}

/** The server is given the application's role only; migrations and the demo loader also get the owner's. */
export function serverEnvironment(settings, urls, env = process.env) {
  return {
    ...env,
    NODE_ENV: env.NODE_ENV || 'production',
    DATABASE_URL: urls.appUrl,
    SESSION_SECRET: env.SESSION_SECRET || sessionSecret(),
    PORT: String(settings.port),
    MQTT_PORT: String(settings.mqttPort),
    BIND: settings.bind,
    MIGRATIONS_DATABASE_URL: '',
  };
}

export const ownerEnvironment = (settings, urls, env) => ({
  ...serverEnvironment(settings, urls, env),
  MIGRATIONS_DATABASE_URL: urls.ownerUrl,
});

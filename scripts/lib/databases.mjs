/** Databases inside a cluster. Every name that reaches SQL here is checked first. */
import { roles } from './cluster-setup.mjs';

const NAME = /^[a-z][a-z0-9_]{0,62}$/;

function checkedName(name) {
  if (!NAME.test(name))
    throw new Error(`A database name is lower-case letters, digits and _: “${name}” is not.`);
  return name;
}

/** The same URL with another database. */
export function withDatabase(url, name) {
  const changed = new URL(url);
  changed.pathname = `/${checkedName(name)}`;
  return changed.href;
}

/** Connects, runs `work(client)`, and always closes. Loaded late: `pg` may only just have been installed. */
export async function withClient(url, work) {
  const { default: pg } = await import('pg');
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: 10_000 });
  // A server that ends while we are connected is told by the failing query, not by a crash.
  client.on('error', () => {});
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end().catch(() => {});
  }
}

/**
 * Creates a database owned by saltmark_owner that the application's role may connect to. `urls` are the cluster's
 * (superuserUrl, ownerUrl, appUrl); answers the same three for the new database.
 */
export async function createDatabase(urls, name, { template } = {}) {
  checkedName(name);
  const from = template ? ` template ${checkedName(template)}` : '';
  await withClient(urls.superuserUrl, async (client) => {
    await client.query(`create database ${name} owner ${roles.owner}${from}`);
    await client.query(`revoke all on database ${name} from public`);
    await client.query(`grant connect, temporary on database ${name} to ${roles.app}`);
  });
  const own = urlsFor(urls, name);
  if (!template) await prepareSchema(own.superuserUrl);
  return own;
}

export function urlsFor(urls, name) {
  return {
    superuserUrl: withDatabase(urls.superuserUrl, name),
    ownerUrl: withDatabase(urls.ownerUrl, name),
    appUrl: withDatabase(urls.appUrl, name),
  };
}

export async function dropDatabase(urls, name) {
  await withClient(withDatabase(urls.superuserUrl, 'postgres'), (client) =>
    client.query(`drop database if exists ${checkedName(name)} with (force)`),
  );
}

export async function databaseExists(urls, name) {
  return withClient(urls.superuserUrl, async (client) => {
    const { rowCount } = await client.query('select 1 from pg_database where datname = $1', [name]);
    return rowCount === 1;
  });
}

async function prepareSchema(superuserUrl) {
  await withClient(superuserUrl, async (client) => {
    await client.query('create extension if not exists btree_gist');
    await client.query(`alter schema public owner to ${roles.owner}`);
    await client.query('revoke all on schema public from public');
    await client.query(`grant usage on schema public to ${roles.app}`);
  });
}

/**
 * One cluster and one migrated template for all tests with a database. `npm test` has started the cluster and says
 * where it is; run directly, vitest gets a cluster of its own that ends with it.
 */
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { migrate } from '../../server/db/migrator.ts';
import { startCluster } from '../../scripts/lib/cluster.mjs';
import { createDatabase, databaseExists, dropDatabase } from '../../scripts/lib/databases.mjs';
import { TEMPLATE, type DatabaseUrls, type TestCluster } from './database.ts';

const VARIABLE = 'SALTMARK_TEST_CLUSTER';

async function startOwnCluster(): Promise<{ urls: DatabaseUrls; stop: () => Promise<void> }> {
  const dir = mkdtempSync(join(tmpdir(), 'saltmark-tests-'));
  chmodSync(dir, 0o755);
  const cluster = await startCluster({ dir, fsync: false });
  const stop = async () => {
    await cluster.stop();
    rmSync(dir, { recursive: true, force: true });
  };
  return { urls: cluster, stop };
}

async function migrateTemplate(urls: DatabaseUrls): Promise<void> {
  if (await databaseExists(urls, TEMPLATE)) await dropDatabase(urls, TEMPLATE);
  const template = await createDatabase(urls, TEMPLATE);
  await migrate({ ownerUrl: template.ownerUrl });
}

export default async function setup(): Promise<(() => Promise<void>) | undefined> {
  const known = process.env[VARIABLE];
  const cluster: TestCluster | undefined = known ? (JSON.parse(known) as TestCluster) : undefined;
  // A second project of the same run: the first has done everything.
  if (cluster?.templateReady) return undefined;

  const own = cluster ? undefined : await startOwnCluster();
  const { superuserUrl, ownerUrl, appUrl } = cluster ?? (own as { urls: DatabaseUrls }).urls;
  const urls = { superuserUrl, ownerUrl, appUrl };
  try {
    await migrateTemplate(urls);
  } catch (error) {
    await own?.stop();
    throw error;
  }
  process.env[VARIABLE] = JSON.stringify({ ...urls, templateReady: true } satisfies TestCluster);
  return own?.stop;
}

/** A database of its own for a test file: cloned from the migrated template, empty, dropped afterwards. */
import { randomBytes } from 'node:crypto';
import { createDatabase, dropDatabase } from '../../scripts/lib/databases.mjs';

export const TEMPLATE = 'saltmark_template';

export interface DatabaseUrls {
  superuserUrl: string;
  ownerUrl: string;
  appUrl: string;
}

export interface TestCluster extends DatabaseUrls {
  templateReady?: boolean;
}

export interface TestDatabase extends DatabaseUrls {
  name: string;
  drop(): Promise<void>;
}

export function testCluster(): TestCluster {
  const told = process.env.SALTMARK_TEST_CLUSTER;
  if (!told) {
    throw new Error(
      'No test cluster: put this test under tests/server, tests/ingest or tests/journeys, which get one.',
    );
  }
  return JSON.parse(told) as TestCluster;
}

/**
 * Creates a migrated, empty database. Call it in `beforeAll`, `drop()` in `afterAll` (after closing your pools);
 * `migrated: false` gives an empty one with the extension and roles only.
 */
export async function freshDatabase({ migrated = true } = {}): Promise<TestDatabase> {
  const cluster = testCluster();
  const name = `test_${randomBytes(6).toString('hex')}`;
  const urls = await createDatabase(cluster, name, migrated ? { template: TEMPLATE } : {});
  return { ...urls, name, drop: () => dropDatabase(cluster, name) };
}

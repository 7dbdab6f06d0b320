import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

// Civil dates must not depend on where the tests run; children inherit this.
process.env.TZ = 'UTC';

const root = fileURLToPath(new URL('..', import.meta.url));
const folders = (...names: string[]) => names.map((name) => `tests/${name}/**/*.test.{ts,tsx}`);

/** Groups run one after the other: the pure tests first, then those with a database, then the browser. */
export default defineConfig({
  root,
  test: {
    root,
    maxWorkers: 2,
    projects: [
      {
        root,
        test: {
          name: 'unit',
          include: [
            ...folders('science', 'reference', 'contracts', 'format', 'simulator', 'scripts'),
            'tests/architecture.test.ts',
          ],
          environment: 'node',
          testTimeout: 20_000,
          hookTimeout: 60_000,
          maxWorkers: 2,
          sequence: { groupOrder: 0 },
        },
      },
      {
        root,
        test: {
          name: 'client',
          include: folders('client'),
          environment: 'happy-dom',
          testTimeout: 20_000,
          maxWorkers: 2,
          sequence: { groupOrder: 1 },
        },
      },
      {
        root,
        test: {
          name: 'server',
          include: folders('server', 'ingest'),
          environment: 'node',
          globalSetup: 'tests/support/global-setup.ts',
          testTimeout: 30_000,
          hookTimeout: 60_000,
          maxWorkers: 2,
          sequence: { groupOrder: 2 },
        },
      },
      {
        root,
        test: {
          name: 'journeys',
          include: folders('journeys'),
          environment: 'node',
          globalSetup: 'tests/support/global-setup.ts',
          testTimeout: 120_000,
          hookTimeout: 180_000,
          maxWorkers: 1,
          fileParallelism: false,
          sequence: { groupOrder: 3 },
        },
      },
    ],
  },
});

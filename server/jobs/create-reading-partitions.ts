/** Keeps the months of readings made ahead. A row without its month is caught by the catch-all partition and moved later. */
import type { Job } from './job.ts';
import { ensureReadingPartitions } from './queries.ts';

/** Devices buffer a week or two, so that readings of last month still come. */
const monthsBack = 1;
/** A server that was not restarted for a quarter still has somewhere to write. */
const monthsAhead = 3;

export const createReadingPartitions: Job = {
  name: 'create-reading-partitions',
  schedule: '0 20 2 * * *',
  runsAtStart: true,
  run: async ({ parts, pool }) => {
    const made = await ensureReadingPartitions(pool, monthsBack, monthsAhead);
    if (made.length > 0) parts.log.info({ made }, 'months of readings made');
  },
};

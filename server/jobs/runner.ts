/** Runs each job on its schedule, in one instance of however many there are. */
import cron from 'node-cron';
import type pg from 'pg';
import { openPool } from '../lib/pool.ts';
import type { Parts } from '../parts.ts';
import { jobs as allJobs } from './definitions.ts';
import type { Job } from './job.ts';
import { tryLockJob, unlockJob } from './queries.ts';

export type RunOutcome = 'done' | 'elsewhere' | 'failed';

export interface RunningJobs {
  /** Runs a job now, unless another instance (or this one) is at it. */
  runNow: (name: string) => Promise<RunOutcome>;
  stop: () => Promise<void>;
}

/** One lock holder and one worker for each of two jobs at a time. */
const poolSize = 4;
/** One failure may be a restart of the database; three in a row need a person. */
const failuresAllowed = 2;

export async function startJobs(parts: Parts, jobs: readonly Job[] = allJobs): Promise<RunningJobs> {
  const { log, config } = parts;
  const pool = openPool(
    {
      connectionString: config.databaseUrl,
      max: poolSize,
      application_name: 'saltmark jobs',
    },
    (error) => log.warn({ err: error }, 'a database connection of the jobs ended'),
  );
  const failures = new Map<string, number>();
  const running = new Set<Promise<RunOutcome>>();

  const run = async (job: Job): Promise<RunOutcome> => {
    try {
      const isMine = await underLock(pool, job.name, () => job.run({ parts, pool }));
      failures.delete(job.name);
      return isMine ? 'done' : 'elsewhere';
    } catch (error) {
      failures.set(job.name, (failures.get(job.name) ?? 0) + 1);
      log.error({ err: error, job: job.name }, 'a job failed');
      return 'failed';
    }
  };
  const tracked = (job: Job): Promise<RunOutcome> => {
    const outcome = run(job).finally(() => running.delete(outcome));
    running.add(outcome);
    return outcome;
  };

  const tasks = jobs.map((job) => {
    const task = cron.schedule(job.schedule, () => tracked(job), {
      timezone: 'UTC',
      noOverlap: true,
      name: job.name,
    });
    task.on('execution:missed', () => log.warn({ job: job.name }, 'a job missed its time'));
    return task;
  });
  for (const job of jobs) if (job.runsAtStart) void tracked(job);
  parts.health.push({
    name: 'jobs',
    check: async () => {
      const failing = [...failures].filter(([, count]) => count > failuresAllowed).map(([name]) => name);
      return failing.length === 0
        ? { up: true }
        : { up: false, detail: `${failing.join(', ')} keeps failing` };
    },
  });

  return {
    runNow: (name) => {
      const job = jobs.find((candidate) => candidate.name === name);
      if (!job) return Promise.reject(new RangeError(`There is no job ${name}.`));
      return tracked(job);
    },
    stop: async () => {
      await Promise.all(tasks.map((task) => task.destroy()));
      await Promise.all(running);
      await pool.end();
    },
  };
}

/** False when another connection holds the lock. The lock ends with its connection, so a crash leaves none behind. */
async function underLock(pool: pg.Pool, name: string, work: () => Promise<void>): Promise<boolean> {
  const holder = await pool.connect();
  let failure: Error | undefined;
  try {
    if (!(await tryLockJob(holder, name))) return false;
    await work();
    return true;
  } catch (error) {
    failure = error as Error;
    throw error;
  } finally {
    // After a failure the connection may be broken: closing it gives up the lock as well.
    if (failure) holder.release(failure);
    else {
      await unlockJob(holder, name).then(
        () => holder.release(),
        (error: Error) => holder.release(error),
      );
    }
  }
}

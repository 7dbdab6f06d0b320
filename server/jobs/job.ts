/** What a job is: a name, when, and what it does. Any instance may run it, one at a time. */
import type { Pool } from 'pg';
import type { Parts } from '../parts.ts';

export interface JobContext {
  parts: Parts;
  pool: Pool;
}

export interface Job {
  /** Verb and noun, the name of its file. */
  name: string;
  /** Cron expression in UTC, with seconds. A missed tick is not made up for: a job finds its own work. */
  schedule: string;
  /** Also once when the server starts. */
  runsAtStart: boolean;
  run: (context: JobContext) => Promise<void>;
}

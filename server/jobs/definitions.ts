/** Every job there is. */
import type { Job } from './job.ts';
import { createReadingPartitions } from './create-reading-partitions.ts';
import { raiseDuePrompts } from './raise-due-prompts.ts';
import { rollUpReadings } from './roll-up-readings.ts';
import { sendDueMails } from './send-due-mails.ts';

export const jobs: readonly Job[] = [createReadingPartitions, rollUpReadings, raiseDuePrompts, sendDueMails];

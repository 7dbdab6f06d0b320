/**
 * Keeps the 10-minute summaries of readings that charts over weeks are drawn from. Each run makes the newest ones
 * again, up to where readings may still arrive in good time, then whatever late readings have marked. After a
 * standstill it goes on from where it was.
 */
import type { Job } from './job.ts';
import {
  rollUpMarked,
  rollUpSpan,
  selectOldestReadingAt,
  selectWatermark,
  writeWatermark,
} from './queries.ts';

export const watermarkKey = 'roll-up-readings';

const bucketMs = 600_000;
/** Readings up to 15 minutes old are not marked as late; five more are for the commit and this job's own pace. */
const lookBackMs = 20 * 60_000;
/** Readings may be dated two minutes ahead. */
const aheadMs = 3 * 60_000;
/** One statement's worth while catching up. */
const spanMs = 86_400_000;
/** Marks taken in one statement: few enough that a commit waiting for one of them waits milliseconds. */
const marksAtOnce = 200;

export const rollUpReadings: Job = {
  name: 'roll-up-readings',
  schedule: '15 * * * * *',
  runsAtStart: true,
  run: async ({ parts, pool }) => {
    const nowMs = parts.clock.now().getTime();
    const rolledUpTo = (await selectWatermark(pool, watermarkKey)) ?? (await selectOldestReadingAt(pool));
    const startMs = Math.min(rolledUpTo?.getTime() ?? nowMs, nowMs) - lookBackMs;
    const endMs = nowMs + aheadMs;
    for (let fromMs = Math.floor(startMs / bucketMs) * bucketMs; fromMs < endMs; fromMs += spanMs) {
      const toMs = Math.min(fromMs + spanMs, endMs);
      await rollUpSpan(pool, new Date(fromMs), new Date(toMs));
      await writeWatermark(pool, watermarkKey, new Date(Math.min(toMs, nowMs)));
    }
    while ((await rollUpMarked(pool, marksAtOnce)) === marksAtOnce);
  },
};

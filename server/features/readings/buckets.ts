/** How a long history is cut into at most 1 000 points. */
import { maxSeriesPoints } from '../../../shared/contracts/readings.ts';

/** Ten years, leap days included: as long as records of a probe are looked at in one chart. */
export const longestWindowMs = 3653 * 86_400_000;

/** The summaries' own length; longer buckets are multiples of it. */
const rollupSeconds = 600;

/** Steps people read off a time axis, from a second to four days (ten years in fewer than 1 000 buckets). */
const ladderSeconds = [
  1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 1200, 1800, 3600, 7200, 10_800, 21_600, 43_200, 86_400, 172_800,
  345_600,
] as const;

/**
 * The shortest bucket that keeps the window within the limit, and whether the summaries serve it. Where the single
 * readings are gone (`onlyRollups`), nothing finer than a summary is left.
 */
export function chooseBuckets(
  windowMs: number,
  onlyRollups: boolean,
): { seconds: number; fromRollups: boolean } {
  // A window that starts inside a bucket touches one more than its length asks for.
  const fits = (seconds: number) =>
    Math.ceil(windowMs / 1000 / seconds) + 1 <= maxSeriesPoints && (!onlyRollups || seconds >= rollupSeconds);
  const seconds = ladderSeconds.find(fits) ?? ladderSeconds.at(-1)!;
  return { seconds, fromRollups: seconds >= rollupSeconds };
}

/** True when summaries reach further back than the readings, which are kept for a shorter time. */
export const isOlderThan = (oldestRollup: Date | null, oldestReading: Date | undefined): boolean =>
  oldestRollup !== null &&
  (oldestReading === undefined || oldestRollup.getTime() + rollupSeconds * 1000 <= oldestReading.getTime());

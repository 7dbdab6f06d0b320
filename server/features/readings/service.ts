/** Readings as judged now, and how they ran. */
import { maxSeriesPoints, type SeriesQuery } from '../../../shared/contracts/readings.ts';
import { AppError } from '../../errors.ts';
import { Probe } from '../../db/models/index.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { readSetting } from '../settings/service.ts';
import { chooseBuckets, isOlderThan, longestWindowMs } from './buckets.ts';
import { readingPolicy } from './policy.ts';
import type { SeriesFacts } from './presenter.ts';
import {
  selectComparisons,
  selectOldestRollup,
  selectReadingBuckets,
  selectRollupBuckets,
  selectSingleReadings,
  selectStandingProbes,
  selectStands,
  type ComparisonRow,
} from './queries.ts';
import { judgeStanding, type Verdict, type VerdictRules } from './verdicts.ts';

const codes = { notFound: 'probes.not-found', forbidden: 'probes.not-found' } as const;
/** The newest comparison judges; three earlier ones are drawn behind it. */
export const comparisonsShown = 4;

export async function readVerdictRules(): Promise<VerdictRules> {
  const [fitness, uncertainty] = await Promise.all([
    readSetting('check-fitness'),
    readSetting('check-uncertainty'),
  ]);
  return { fitness, uncertainty };
}

/** The newest comparisons of each probe, newest first. */
export async function comparisonsOf(
  parts: Parts,
  probeIds: readonly number[],
  perProbe: number,
): Promise<Map<number, ComparisonRow[]>> {
  const byProbe = new Map<number, ComparisonRow[]>();
  for (const row of await selectComparisons(parts, probeIds, perProbe)) {
    const known = byProbe.get(row.probeId);
    if (known) known.push(row);
    else byProbe.set(row.probeId, [row]);
  }
  return byProbe;
}

/** The verdict on each of the probes, wherever they stand, by a fixed number of queries. */
export async function judgeProbes(
  parts: Parts,
  probeIds: readonly number[],
  perProbe: number = comparisonsShown,
): Promise<Map<number, Verdict>> {
  if (probeIds.length === 0) return new Map();
  const now = parts.clock.now();
  const [rows, comparisons, rules] = await Promise.all([
    selectStandingProbes(parts, probeIds, now),
    comparisonsOf(parts, probeIds, perProbe),
    readVerdictRules(),
  ]);
  return new Map(
    rows.map((row) => [row.probeId!, judgeStanding(row, comparisons.get(row.probeId!) ?? [], now, rules)]),
  );
}

/** The history of one probe, as single readings when they fit, else in buckets the server chooses. */
export async function readSeries(parts: Parts, actor: Actor, query: SeriesQuery): Promise<SeriesFacts> {
  const window = { probeId: query.probeId, from: new Date(query.from), to: new Date(query.to) };
  const lengthMs = window.to.getTime() - window.from.getTime();
  if (lengthMs <= 0 || lengthMs > longestWindowMs) throw new AppError('readings.window-invalid');
  const probe = await Probe.findByPk(query.probeId, { attributes: ['siteId'] });
  if (!probe) throw new AppError('probes.not-found');
  authorise(readingPolicy, 'read', actor, probe.siteId, codes);

  const [stands, single, oldestRollup] = await Promise.all([
    selectStands(parts, window),
    selectSingleReadings(parts, window, maxSeriesPoints + 1),
    selectOldestRollup(parts, window),
  ]);
  const onlyRollups = isOlderThan(oldestRollup, single[0]?.at);
  if (single.length <= maxSeriesPoints && !onlyRollups)
    return { ...window, stands, rows: single, bucketSeconds: null };
  const { seconds, fromRollups } = chooseBuckets(lengthMs, onlyRollups);
  const select = fromRollups ? selectRollupBuckets : selectReadingBuckets;
  return { ...window, stands, rows: await select(parts, window, seconds), bucketSeconds: seconds };
}

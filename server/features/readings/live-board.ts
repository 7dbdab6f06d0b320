/** The board people watch: every point with its verdict, and how many of each kind stand at each site. */
import type { LiveBoard } from '../../../shared/contracts/readings.ts';
import type { Criticality, TrustLevel } from '../../../shared/contracts/vocabulary.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { sitePolicy } from '../sites/policy.ts';
import { sitesForBoard, type BoardSite } from '../sites/service.ts';
import { presentLiveRow } from './presenter.ts';
import { selectStandingPoints, selectTraces, type BucketRow, type StandingRow } from './queries.ts';
import { comparisonsOf, comparisonsShown, readVerdictRules } from './service.ts';
import { judgeStanding, type Verdict } from './verdicts.ts';

/** More than fit on any screen; beyond it somebody opens the site. */
const maxRowsOfAllSites = 50;
/** Two hours in 60 steps: the trace is a finger wide. */
const traceBuckets = 60;
const traceBucketSeconds = 120;

interface JudgedPoint {
  row: StandingRow;
  verdict: Verdict;
}

const idsOf = (rows: readonly StandingRow[]): number[] =>
  rows.flatMap(({ probeId }) => (probeId === null ? [] : [probeId]));

async function judgePoints(
  parts: Parts,
  rows: readonly StandingRow[],
  perProbe: number,
): Promise<JudgedPoint[]> {
  const now = parts.clock.now();
  const [comparisons, rules] = await Promise.all([
    comparisonsOf(parts, idsOf(rows), perProbe),
    readVerdictRules(),
  ]);
  return rows.map((row) => ({
    row,
    verdict: judgeStanding(row, comparisons.get(row.probeId ?? 0) ?? [], now, rules),
  }));
}

/** The last 60 buckets up to now, by probe. */
async function tracesOf(parts: Parts, rows: readonly StandingRow[]): Promise<Map<number, BucketRow[]>> {
  const stepMs = traceBucketSeconds * 1000;
  const current = Math.floor(parts.clock.now().getTime() / stepMs) * stepMs;
  const from = new Date(current - (traceBuckets - 1) * stepMs);
  const buckets = await selectTraces(parts, idsOf(rows), from, parts.clock.now(), traceBucketSeconds);
  const byProbe = new Map<number, BucketRow[]>();
  for (const bucket of buckets) {
    const known = byProbe.get(bucket.probeId);
    if (known) known.push(bucket);
    else byProbe.set(bucket.probeId, [bucket]);
  }
  return byProbe;
}

type Counts = LiveBoard['sites'][number]['counts'];
const countOf: Record<TrustLevel, keyof Counts> = {
  fit: 'fit',
  'use-with-care': 'useWithCare',
  'do-not-use': 'doNotUse',
  'no-signal': 'noSignal',
};

function countBySite(sites: readonly BoardSite[], points: readonly JudgedPoint[]): LiveBoard['sites'] {
  const counts = new Map<number, Counts>(
    sites.map(({ id }) => [id, { fit: 0, useWithCare: 0, doNotUse: 0, held: 0, noSignal: 0 }]),
  );
  for (const { row, verdict } of points) {
    const ofSite = counts.get(row.siteId);
    if (ofSite) ofSite[row.holdUserId === null ? countOf[verdict.trust.level] : 'held'] += 1;
  }
  return sites.map((site) => ({ ...site, counts: counts.get(site.id)! }));
}

/** What calls for a person first. A held point has somebody already. */
const urgency: Partial<Record<TrustLevel, number>> = { 'do-not-use': 0, 'no-signal': 1, 'use-with-care': 2 };
const weight: Record<Criticality, number> = { critical: 0, high: 1, medium: 2, low: 3 };

function needingPeople(points: readonly JudgedPoint[]): StandingRow[] {
  return points
    .filter(({ row, verdict }) => row.holdUserId === null && urgency[verdict.trust.level] !== undefined)
    .sort(
      (a, b) =>
        urgency[a.verdict.trust.level]! - urgency[b.verdict.trust.level]! ||
        weight[a.row.criticality!] - weight[b.row.criticality!],
    )
    .slice(0, maxRowsOfAllSites)
    .map(({ row }) => row);
}

/** One site with all its points, or all sites with those that need a person first. */
export async function readLiveBoard(
  parts: Parts,
  actor: Actor,
  siteId: number | undefined,
): Promise<LiveBoard> {
  if (siteId !== undefined)
    authorise(sitePolicy, 'read', actor, siteId, {
      notFound: 'sites.not-found',
      forbidden: 'sites.forbidden',
    });
  const siteIds = siteId === undefined ? readableSites(actor) : [siteId];
  const [sites, standing] = await Promise.all([
    sitesForBoard(parts, siteIds),
    selectStandingPoints(parts, siteIds, parts.clock.now()),
  ]);
  const isOneSite = siteId !== undefined;
  const points = await judgePoints(parts, standing, isOneSite ? comparisonsShown : 1);
  const shown = isOneSite ? standing : needingPeople(points);
  const [judged, traces] = await Promise.all([
    isOneSite ? points : judgePoints(parts, shown, comparisonsShown),
    tracesOf(parts, shown),
  ]);
  return {
    at: parts.clock.now().toISOString(),
    sites: countBySite(sites, points),
    rows: judged.map(({ row, verdict }) =>
      presentLiveRow(row, verdict, traces.get(row.probeId ?? 0) ?? [], actor),
    ),
  };
}

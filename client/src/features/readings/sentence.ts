import type { LiveBoard, LiveRow } from '../../../../shared/contracts/readings.ts';
import { capitalise } from '../../../../shared/format/labels.ts';
import { countInWords } from '../../../../shared/format/numbers.ts';

/** A piece of a sentence; the exception is strong. */
export interface SentencePart {
  text: string;
  isStrong: boolean;
}

interface Clause {
  text: string;
  isStrong?: boolean;
}

const verb = (count: number, one: string, many: string) =>
  `${countInWords(count)} ${count === 1 ? one : many}`;

/** The situation at one site in one or two sentences: how many readings are fit, then every exception, gravest last. */
export function siteSentence(rows: readonly LiveRow[], now: number): SentencePart[] {
  const held = rows.filter((row) => row.hold !== null);
  const free = rows.filter((row) => row.hold === null);
  const of = (level: LiveRow['trust']['level']) => free.filter((row) => row.trust.level === level);
  const isAway = (row: LiveRow) => row.trust.reason === 'not-in-process';
  const away = of('do-not-use').filter(isAway);
  const stop = of('do-not-use').filter((row) => !isAway(row));
  const bare = of('no-signal').filter((row) => row.trust.reason === 'no-probe');
  const silent = of('no-signal').filter((row) => row.trust.reason !== 'no-probe');
  return compose(of('fit').length, rows.length, '', [
    of('use-with-care').length > 0 && { text: verb(of('use-with-care').length, 'needs care', 'need care') },
    away.length > 0 && { text: verb(away.length, 'is out of the process', 'are out of the process') },
    held.length > 0 && { text: heldWords(held) },
    bare.length > 0 && { text: verb(bare.length, 'has no probe', 'have no probe') },
    silent.length > 0 && { text: silentWords(silent, now) },
    stop.length > 0 && { text: `${verb(stop.length, 'must', 'must')} not be used`, isStrong: true },
  ]);
}

/** The situation of all sites, from their counts. */
export function allSitesSentence(sites: LiveBoard['sites']): SentencePart[] {
  const total = sum(sites);
  const where = sites.length > 1 ? ` at ${countInWords(sites.length)} sites` : '';
  return compose(total.fit, pointsOf(total), where, countClauses(total));
}

/** One site among others, in the shortest words that still name every exception. */
export function siteLine(counts: Counts): SentencePart[] {
  return compose(counts.fit, pointsOf(counts), '', countClauses(counts));
}

/** The plain text of a sentence, for titles and tests. */
export function plainText(parts: readonly SentencePart[]): string {
  return parts.map((part) => part.text).join('');
}

type Counts = LiveBoard['sites'][number]['counts'];

function countClauses(counts: Counts): (Clause | false)[] {
  return [
    counts.useWithCare > 0 && { text: verb(counts.useWithCare, 'needs care', 'need care') },
    counts.held > 0 && { text: verb(counts.held, 'is held', 'are held') },
    counts.noSignal > 0 && { text: verb(counts.noSignal, 'sends no signal', 'send no signal') },
    counts.doNotUse > 0 && { text: `${verb(counts.doNotUse, 'must', 'must')} not be used`, isStrong: true },
  ];
}

export const pointsOf = ({ fit, useWithCare, doNotUse, held, noSignal }: Counts): number =>
  fit + useWithCare + doNotUse + held + noSignal;

function sum(sites: LiveBoard['sites']): Counts {
  const total: Counts = { fit: 0, useWithCare: 0, doNotUse: 0, held: 0, noSignal: 0 };
  for (const { counts } of sites) {
    for (const key of Object.keys(total) as (keyof Counts)[]) total[key] += counts[key];
  }
  return total;
}

function compose(fit: number, all: number, where: string, clauses: (Clause | false)[]): SentencePart[] {
  const exceptions = clauses.filter((clause): clause is Clause => clause !== false);
  const opening = { text: `${fitWords(fit, all, where)}.`, isStrong: false };
  if (exceptions.length === 0) return [opening];
  const parts: SentencePart[] = [{ text: `${opening.text} `, isStrong: false }];
  exceptions.forEach(({ text, isStrong = false }, i) => {
    const isLast = i === exceptions.length - 1;
    const join = i === 0 ? '' : isLast ? (exceptions.length > 2 ? ', and ' : ' and ') : ', ';
    if (join) parts.push({ text: join, isStrong: false });
    parts.push({ text: (i === 0 ? capitalise(text) : text) + (isLast ? '.' : ''), isStrong });
  });
  return parts;
}

function fitWords(fit: number, all: number, where: string): string {
  if (all === 0) return `No measuring point is set up${where || ' here'} yet`;
  if (all === 1) return `The one reading${where} is ${fit === 1 ? '' : 'not '}fit to use`;
  if (fit === all) return `All ${countInWords(all)} readings${where} are fit to use`;
  if (fit === 0) return `None of ${countInWords(all)} readings${where} is fit to use`;
  const verbOf = fit === 1 ? 'is' : 'are';
  return `${capitalise(countInWords(fit))} of ${countInWords(all)} readings${where} ${verbOf} fit to use`;
}

function heldWords(held: readonly LiveRow[]): string {
  const names = [...new Set(held.flatMap((row) => (row.hold ? [row.hold.userName] : [])))];
  const count = verb(held.length, 'is held', 'are held');
  return names.length === 1 ? `${count} for ${names[0]}` : count;
}

function silentWords(silent: readonly LiveRow[], now: number): string {
  const [first] = silent;
  if (silent.length > 1 || !first?.reading) return verb(silent.length, 'sends no signal', 'send no signal');
  return `one has been silent for ${spanInWords(now - Date.parse(first.reading.at))}`;
}

const MINUTE_MS = 60_000;
/** A unit is used until the next one up says enough: 90 minutes, then hours to a day and a half, then days. */
const SPANS: readonly [limitMs: number, unitMs: number, name: string][] = [
  [90 * MINUTE_MS, MINUTE_MS, 'minute'],
  [36 * 60 * MINUTE_MS, 60 * MINUTE_MS, 'hour'],
  [Infinity, 24 * 60 * MINUTE_MS, 'day'],
];

/** A span as a sentence says it: `58 minutes`, `five hours`, `three days`. */
export function spanInWords(ms: number): string {
  const [, unit, name] = SPANS.find(([limit]) => ms < limit) ?? SPANS[0]!;
  const count = Math.max(1, Math.floor(ms / unit));
  return `${countInWords(count)} ${name}${count === 1 ? '' : 's'}`;
}

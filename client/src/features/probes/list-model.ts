import type { ProbesQuery, ProbeRow } from '../../../../shared/contracts/probes.ts';
import { probeKinds, probeStatuses, trustLevels } from '../../../../shared/contracts/vocabulary.ts';
import { PROBE_KIND_LABELS, PROBE_STATUS_LABELS, TRUST_LABELS } from '../../../../shared/format/labels.ts';
import { formatCount } from '../../../../shared/format/numbers.ts';
import type { LedgerSort } from '../../components/ui/ledger-parts.tsx';
import { idOf, oneOf } from '../../lib/use-address-filters.ts';
import type { ProbeFilters } from './api.ts';

export type ProbeSort = ProbesQuery['sort'];

/** The orders the server knows, as the select names them. */
export const PROBE_SORTS: readonly { value: ProbeSort; label: string }[] = [
  { value: 'tag', label: 'tag' },
  { value: 'serial', label: 'serial number' },
  { value: 'point', label: 'measuring point' },
  { value: 'site', label: 'site' },
  { value: '-lastSeen', label: 'seen last, newest first' },
  { value: 'lastSeen', label: 'seen last, oldest first' },
];

const ALL_SORTS: readonly ProbeSort[] = [
  ...PROBE_SORTS.map((sort) => sort.value),
  '-tag',
  '-serial',
  '-point',
  '-site',
];

/** What the address asks for, without what it cannot mean. */
export function probeFilters(read: (name: string) => string): ProbeFilters {
  return withoutUndefined({
    q: read('q') || undefined,
    siteId: idOf(read('siteId')),
    kind: oneOf(probeKinds, read('kind')),
    status: oneOf(probeStatuses, read('status')),
    trust: oneOf(trustLevels, read('trust')),
    sort: oneOf(ALL_SORTS, read('sort')) ?? 'tag',
  });
}

function withoutUndefined<Fields extends object>(fields: Fields): ProbeFilters {
  return Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined));
}

export const sortOf = (sort: ProbeSort): LedgerSort => ({
  key: sort.replace('-', ''),
  direction: sort.startsWith('-') ? 'descending' : 'ascending',
});

export const sortText = ({ key, direction }: LedgerSort): string =>
  direction === 'descending' ? `-${key}` : key;

/** Whether anything but the order narrows the list. */
export function isNarrowed({ sort: _order, ...narrowing }: ProbeFilters): boolean {
  return Object.keys(narrowing).length > 0;
}

/** The situation of the list in a sentence: how many, and what they were narrowed to. */
export function listSentence(total: number, filters: ProbeFilters, siteName: string | null): string {
  const where = siteName ? `at ${siteName}` : 'at all your sites';
  const count = formatCount(total, 'probe');
  const narrowed = [
    filters.kind && PROBE_KIND_LABELS[filters.kind],
    filters.status && PROBE_STATUS_LABELS[filters.status],
    filters.trust && TRUST_LABELS[filters.trust],
    filters.q && `with “${filters.q}” in tag, serial number or point`,
  ].filter(Boolean);
  const opening = total === 0 ? 'No probe' : capital(count);
  return narrowed.length > 0 ? `${opening} ${where}: ${narrowed.join(', ')}.` : `${opening} ${where}.`;
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** Where a probe is: its point, else that it is a spare, in quarantine or retired, and where it is kept. */
export function whereWords(row: Pick<ProbeRow, 'placement' | 'status' | 'siteName'>): {
  name: string;
  note: string;
} {
  const { placement } = row;
  if (!placement) return { name: PROBE_STATUS_LABELS[row.status], note: `kept at ${row.siteName}` };
  return { name: placement.pointName, note: `${placement.siteName} · ${placement.areaName}` };
}

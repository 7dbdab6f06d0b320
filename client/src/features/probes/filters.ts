import type { ProbesQuery } from '../../../../shared/contracts/probes.ts';
import { probeKinds, probeStatuses, trustLevels } from '../../../../shared/contracts/vocabulary.ts';
import type { LedgerSort } from '../../components/ui/ledger-parts.tsx';
import type { ProbeFilters } from './api.ts';

type Sort = ProbesQuery['sort'];
const SORTS: readonly Sort[] = [
  'tag',
  '-tag',
  'serial',
  '-serial',
  'point',
  '-point',
  'site',
  '-site',
  'lastSeen',
  '-lastSeen',
];

/** The filters that stand in an address; what means nothing there is left out. */
export function filtersFrom(params: URLSearchParams): ProbeFilters {
  const one = <Value extends string>(name: string, known: readonly Value[]) =>
    known.find((value) => value === params.get(name));
  const siteId = Number(params.get('siteId'));
  const [kind, status] = [one('kind', probeKinds), one('status', probeStatuses)];
  const [trust, sort] = [one('trust', trustLevels), one('sort', SORTS)];
  const q = params.get('q')?.trim();
  return {
    ...(q ? { q } : {}),
    ...(Number.isInteger(siteId) && siteId > 0 ? { siteId } : {}),
    ...(kind ? { kind } : {}),
    ...(status ? { status } : {}),
    ...(trust ? { trust } : {}),
    ...(sort ? { sort } : {}),
  };
}

/** Whether anything narrows the list; an order does not. */
export const isNarrowed = ({ sort: _order, ...narrowing }: ProbeFilters): boolean =>
  Object.keys(narrowing).length > 0;

export function sortOf({ sort = 'tag' }: ProbeFilters): LedgerSort {
  return { key: sort.replace('-', ''), direction: sort.startsWith('-') ? 'descending' : 'ascending' };
}

export const sortText = ({ key, direction }: LedgerSort): string =>
  direction === 'descending' ? `-${key}` : key;

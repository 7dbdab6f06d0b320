import type { SearchHit } from '../../../../shared/contracts/search.ts';
import type { SearchResult } from '../../components/ui/search-box.tsx';
import { paths } from '../../paths.ts';

/** A hit as a line of the result list. */
export function resultOf(hit: SearchHit): SearchResult {
  const kind = hit.kind === 'probe' ? 'Probe' : 'Measuring point';
  return { key: `${hit.kind}-${hit.id}`, label: hit.title, hint: `${kind} · ${hit.subtitle}` };
}

/** Where choosing a hit leads. */
export function hrefOf(hit: Pick<SearchHit, 'kind' | 'id'>): string {
  return hit.kind === 'probe' ? paths.probe.to({ id: hit.id }) : paths.point.to({ id: hit.id });
}

import type { SearchHit } from '../../../shared/contracts/search.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { selectHits } from './queries.ts';

/** As many as a list under the search field shows without scrolling on a tablet. */
const maxHits = 20;

/** Finds probes and points of the sites the person may read. */
export function search(parts: Parts, actor: Actor, text: string): Promise<SearchHit[]> {
  const contains = containsPattern(text) ?? '%';
  return selectHits(
    parts,
    { text, contains, begins: contains.slice(1), siteIds: readableSites(actor) },
    maxHits,
  );
}

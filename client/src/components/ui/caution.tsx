import type { ReactNode } from 'react';
import type { HazardTag } from '../../../../shared/contracts/vocabulary.ts';
import { HAZARD_CAUTIONS, SITE_RULES_FIRST } from '../../../../shared/format/cautions.ts';
import { capitalise } from '../../../../shared/format/labels.ts';

/** One caution: two posts and a bar, and the words. */
export function Caution({ children }: { children: ReactNode }) {
  return (
    <div className="caution" role="note">
      <svg width="22" height="20" viewBox="0 0 22 20" aria-hidden="true">
        <path d="M2 2V18M20 2V18M2 10H20" stroke="currentColor" strokeWidth="2.5" />
      </svg>
      <div>{children}</div>
    </div>
  );
}

/** The cautions that fit a point's hazard tags, and that site rules and permits come first. */
export function HazardCautions({ tags }: { tags: readonly HazardTag[] }) {
  return (
    <Caution>
      {tags.length > 0 ? (
        <ul>
          {tags.map((tag) => (
            <li key={tag}>
              <b>{capitalise(HAZARD_CAUTIONS[tag].label)}.</b> {HAZARD_CAUTIONS[tag].text}
            </li>
          ))}
        </ul>
      ) : null}
      <p className={tags.length > 0 ? 'caution-rules' : undefined}>{SITE_RULES_FIRST}</p>
    </Caution>
  );
}

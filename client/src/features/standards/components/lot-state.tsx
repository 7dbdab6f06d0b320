import type { Standard } from '../../../../../shared/contracts/standards.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { lotState } from '../model.ts';

/** Whether a lot may be used: the word, and why or until when. */
export function LotStateWords({ lot }: { lot: Standard }) {
  const { word, note, tone } = lotState(lot);
  return (
    <span className="cell-say">
      <span className={tone === 'plain' ? undefined : `is-${tone}`}>{capitalise(word)}</span>
      <small>{note}</small>
    </span>
  );
}

import type { Bottle } from '../../../../shared/contracts/bottles.ts';
import { formatDate } from '../../../../shared/format/dates.ts';
import { capitalise } from '../../../../shared/format/labels.ts';
import { countInWords } from '../../../../shared/format/numbers.ts';

export interface BottleState {
  word: string;
  note: string;
  tone: 'plain' | 'care' | 'faint';
}

/** Where a bottle stands between shelf and drain. */
export function bottleState(bottle: Bottle): BottleState {
  if (bottle.discardedAt)
    return {
      word: 'discarded',
      note: `${formatDate(bottle.discardedAt)}: ${bottle.discardedReason ?? 'no reason given'}`,
      tone: 'faint',
    };
  const useBy = `use by ${formatDate(bottle.useByOn)}`;
  const opened = bottle.openedAt
    ? `opened ${formatDate(bottle.openedAt)} by ${bottle.openedBy ?? 'somebody'}`
    : null;
  if (!bottle.isUsable)
    return {
      word: 'not to be used',
      note: bottle.remainingMl === 0 ? 'empty' : [opened, useBy].filter(Boolean).join(', '),
      tone: 'care',
    };
  return opened
    ? { word: 'open', note: `${opened}, ${useBy}`, tone: 'plain' }
    : { word: 'unopened', note: useBy, tone: 'plain' };
}

/** What one may pour from first, then the shelf, then what is gone. */
export function atHandFirst(bottles: readonly Bottle[]): Bottle[] {
  const rank = (bottle: Bottle) => (bottle.discardedAt ? 2 : bottle.openedAt ? 0 : 1);
  return [...bottles].sort(
    (a, b) => rank(a) - rank(b) || a.code.localeCompare(b.code, 'en', { numeric: true }),
  );
}

export function bottlesSentence(bottles: readonly Bottle[]): string {
  const here = bottles.filter((bottle) => !bottle.discardedAt);
  if (here.length === 0) return 'none in stock';
  const open = here.filter((bottle) => bottle.openedAt).length;
  const shut = here.length - open;
  return `${capitalise(countInWords(shut))} unopened, ${countInWords(open)} open`;
}

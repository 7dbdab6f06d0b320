import type { Bottle } from '../../../shared/contracts/bottles.ts';
import type { Actor } from '../../http/actor.ts';
import { may, maySomewhere } from '../../http/authorise.ts';
import { labelOfLot } from '../standards/presenter.ts';
import { bottlePolicy } from './policy.ts';
import type { BottleRow } from './queries.ts';

type Usability = Pick<BottleRow, 'discardedAt' | 'remainingMl' | 'lotState' | 'lotExpiresOn' | 'useByOn'>;

/** `today` is the civil day in UTC; the last day counts. */
export function isBottleUsable(row: Usability, today: string): boolean {
  const isLotUsable = row.lotState === 'released' && row.lotExpiresOn >= today;
  const isInTime = (row.useByOn ?? row.lotExpiresOn) >= today;
  return row.discardedAt === null && row.remainingMl > 0 && isLotUsable && isInTime;
}

/** A bottle that belongs to no site is handled by whoever may at any site. */
export const mayHandleBottle = (
  action: keyof typeof bottlePolicy,
  actor: Pick<Actor, 'grants'>,
  siteId: number | null,
): boolean =>
  siteId === null ? maySomewhere(bottlePolicy, action, actor) : may(bottlePolicy, action, actor, siteId);

export function presentBottle(row: BottleRow, actor: Actor, today: string): Bottle {
  const isThere = row.discardedAt === null;
  const isUsable = isBottleUsable(row, today);
  const mayDo = (action: keyof typeof bottlePolicy) => mayHandleBottle(action, actor, row.siteId);
  return {
    id: row.id,
    code: row.code,
    standardId: row.standardId,
    lotCode: row.lotCode,
    label: labelOfLot(row),
    siteId: row.siteId,
    siteName: row.siteName,
    volumeMl: row.volumeMl,
    remainingMl: row.remainingMl,
    openedAt: row.openedAt?.toISOString() ?? null,
    openedBy: row.openedBy,
    useByOn: row.useByOn ?? row.lotExpiresOn,
    discardedAt: row.discardedAt?.toISOString() ?? null,
    discardedReason: row.discardedReason,
    isUsable,
    version: row.version,
    can: {
      open: isUsable && row.openedAt === null && mayDo('open'),
      setRemaining: isThere && row.openedAt !== null && mayDo('setRemaining'),
      discard: isThere && mayDo('discard'),
    },
  };
}

/** One portion, one use, never poured back: what each comparison takes from its bottle. */
import type { ProbeKind } from '../../../shared/contracts/vocabulary.ts';
import type { Bottle, Standard } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';

/** Rinse and measuring portion together; an inductive probe needs room around it [common practice]. */
const portionMl: Record<ProbeKind, number> = { 'two-electrode': 60, 'four-electrode': 60, inductive: 1200 };

const dayMs = 86_400_000;
const dayOf = (at: Date): string => at.toISOString().slice(0, 10);

/** The earlier of the lot's own expiry and its time after opening. */
function useByAfterOpening(lot: Standard, openedAt: Date): string {
  if (lot.openedLifeDays === null) return lot.expiresOn;
  const last = dayOf(new Date(openedAt.getTime() + lot.openedLifeDays * dayMs));
  return last < lot.expiresOn ? last : lot.expiresOn;
}

export async function takePortion(
  transaction: OpenTransaction,
  bottle: Bottle,
  lot: Standard,
  by: { kind: ProbeKind; userId: number; at: Date },
): Promise<void> {
  const remainingMl = Math.max(0, bottle.remainingMl - portionMl[by.kind]);
  const opening =
    bottle.openedAt === null
      ? { openedAt: by.at, openedBy: by.userId, useByOn: useByAfterOpening(lot, by.at) }
      : {};
  await bottle.update({ remainingMl, ...opening }, { transaction });
}

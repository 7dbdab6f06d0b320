import { Bottle } from '../../server/db/models/index.ts';
import { useByAfterOpening } from '../../server/features/bottles/service.ts';
import { dayOf, need, type Loading } from './loading.ts';

type Lot = Loading['history']['lots'][number];
type BottleOfLot = Lot['bottles'][number];

/** Bottles of a lot stand at the four sites in turn. */
function siteOf(loading: Loading, index: number): number {
  const sites = [...loading.sites.values()];
  return sites[index % sites.length]!;
}

function rowOf(loading: Loading, lot: Lot, bottle: BottleOfLot, index: number) {
  const openedAt = bottle.openedAt === null ? null : new Date(bottle.openedAt);
  return {
    code: bottle.code,
    volumeMl: bottle.volumeMl,
    remainingMl: bottle.remainingMl,
    openedAt,
    useByOn: openedAt && useByAfterOpening(openedAt, lot.openedLifeDays, dayOf(lot.expiresAt)),
    discardedAt: bottle.discardedAt === null ? null : new Date(bottle.discardedAt),
    discardedReason: bottle.discardedAt === null ? null : 'Used up or past its time after opening',
    createdAt: new Date(lot.receivedAt),
    version: (openedAt ? 1 : 0) + (bottle.discardedAt === null ? 0 : 1),
    standardId: need(loading.standards, lot.code),
    siteId: siteOf(loading, index),
    openedBy: bottle.openedBy === null ? null : need(loading.users, bottle.openedBy),
  };
}

/** The bottles of every lot, from the shelf to the drain, with what the trail says of them. */
export async function loadBottles(loading: Loading): Promise<void> {
  for (const lot of loading.history.lots) {
    const rows = await Bottle.bulkCreate(
      lot.bottles.map((bottle, index) => rowOf(loading, lot, bottle, index)),
      { returning: true },
    );
    loading.trail.push({
      action: 'bottles.received',
      objectKind: 'standards',
      objectId: need(loading.standards, lot.code),
      siteId: null,
      newValue: { codes: rows.map((row) => row.code), volumeMl: rows[0]?.volumeMl ?? null },
      at: lot.receivedAt,
      by: 'tomas',
    });
    for (const [index, row] of rows.entries()) {
      if (row.openedAt === null) continue;
      loading.trail.push({
        action: 'bottles.opened',
        objectKind: 'bottles',
        objectId: row.id,
        objectVersion: 1,
        siteId: row.siteId,
        oldValue: { openedAt: null },
        newValue: { openedAt: row.openedAt, useByOn: row.useByOn },
        at: row.openedAt.getTime(),
        by: lot.bottles[index]?.openedBy ?? 'ines',
      });
    }
  }
}

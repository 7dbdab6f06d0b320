/** Walks the whole chain and names the first break. Ships with the product: `npm run verify-audit`. */
import type { ChainReport } from '../../../shared/contracts/audit-events.ts';
import { AuditEvent } from '../../db/models/index.ts';
import { Op } from 'sequelize';
import { hashOfEvent, type ChainedEvent } from './chain.ts';
import { genesisHash } from './queries.ts';

const eventsPerRead = 1000;

export const chainedEventOf = (row: AuditEvent): ChainedEvent => ({
  sequence: Number(row.sequence),
  capturedAt: row.capturedAt.toISOString(),
  receivedAt: row.receivedAt.toISOString(),
  actorKind: row.actorKind,
  actorId: row.actorId,
  actorName: row.actorName,
  actingRole: row.actingRole,
  action: row.action,
  objectKind: row.objectKind,
  objectId: row.objectId,
  objectVersion: row.objectVersion,
  siteId: row.siteId,
  oldValue: row.oldValue ?? null,
  newValue: row.newValue ?? null,
  reason: row.reason,
  source: row.source,
  previousHash: row.previousHash,
});

/** What is wrong with a row that should follow `before`; null when nothing is. */
function breakOf(row: AuditEvent, before: { sequence: number; hash: string }): string | null {
  const event = chainedEventOf(row);
  if (event.sequence !== before.sequence + 1) {
    return `Event ${before.sequence + 1} is missing: after ${before.sequence} comes ${event.sequence}.`;
  }
  if (event.previousHash !== before.hash)
    return 'It does not follow the event before it: the hash it carries is another one.';
  if (hashOfEvent(event) !== row.hash)
    return 'Its content was changed after it was written: the hash does not fit.';
  return null;
}

export async function verifyChain(now: Date): Promise<ChainReport> {
  let before = { sequence: 0, hash: genesisHash };
  let events = 0;
  for (;;) {
    const rows = await AuditEvent.findAll({
      where: { sequence: { [Op.gt]: before.sequence } },
      order: [['sequence', 'ASC']],
      limit: eventsPerRead,
    });
    for (const row of rows) {
      const what = breakOf(row, before);
      const sequence = Number(row.sequence);
      if (what)
        return {
          events,
          isUnbroken: false,
          firstBreak: { sequence, what },
          lastHash: before.hash,
          checkedAt: now.toISOString(),
        };
      before = { sequence, hash: row.hash };
      events += 1;
    }
    if (rows.length < eventsPerRead) break;
  }
  return { events, isUnbroken: true, firstBreak: null, lastHash: before.hash, checkedAt: now.toISOString() };
}

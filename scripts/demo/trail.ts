import { User } from '../../server/db/models/index.ts';
import { inTransaction } from '../../server/db/transaction.ts';
import { grantsOf } from '../../server/features/sessions/service.ts';
import { recordAuditEvent } from '../../server/features/audit-events/service.ts';
import { SettableClock } from '../../server/lib/clock.ts';
import type { Actor } from '../../server/http/actor.ts';
import type { Parts } from '../../server/parts.ts';
import { need, type Loading } from './loading.ts';

/** Writes the trail in the order things happened, through the same service as every slice, so that the chain holds. */
export async function writeTrail(loading: Loading): Promise<number> {
  const actors = new Map<string, Actor>();
  for (const [key, userId] of loading.users) {
    const user = (await User.findByPk(userId))!;
    const grants = await grantsOf(userId, '2000-01-01');
    actors.set(key, {
      userId,
      name: user.name,
      email: user.email,
      grants,
      source: { address: 'private', requestId: 'history' },
    });
  }
  const clock = new SettableClock(new Date(loading.history.startAt));
  const parts = { sequelize: loading.sequelize, clock } as unknown as Parts;
  const entries = [...loading.trail].sort((one, other) => one.at - other.at);
  await inTransaction(loading.sequelize, async (transaction) => {
    for (const { at, by, ...entry } of entries) {
      clock.set(new Date(at));
      await recordAuditEvent(parts, transaction, need(actors, by), entry);
    }
  });
  return entries.length;
}

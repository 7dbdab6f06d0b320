import type { Transaction } from 'sequelize';
import type { Parts } from '../../parts.ts';

/** Any constant nothing else uses: two first visitors at once become one. */
const firstPersonLock = 4_280_002;

export async function lockFirstPerson(
  parts: Pick<Parts, 'sequelize'>,
  transaction: Transaction,
): Promise<void> {
  await parts.sequelize.query('SELECT pg_advisory_xact_lock(:firstPersonLock)', {
    transaction,
    replacements: { firstPersonLock },
  });
}

import type { Sequelize, Transaction } from 'sequelize';
import type { Parts } from '../../parts.ts';

/** Deletes the stored sessions of one person. */
export async function deleteSessions(
  parts: Pick<Parts, 'sequelize'>,
  userId: number,
  transaction: Transaction,
): Promise<void> {
  const sequelize: Sequelize = parts.sequelize;
  await sequelize.query(`DELETE FROM sessions WHERE sess->'passport'->>'user' = :userId`, {
    transaction,
    replacements: { userId: String(userId) },
  });
}

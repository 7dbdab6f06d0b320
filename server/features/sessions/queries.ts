import type { Transaction } from 'sequelize';
import type { Parts } from '../../parts.ts';

/** Ends a person's stored sessions, but for the one kept. */
export async function deleteOtherSessions(
  parts: Pick<Parts, 'sequelize'>,
  userId: number,
  keep: string | null,
  transaction: Transaction,
): Promise<void> {
  await parts.sequelize.query(
    `DELETE FROM sessions WHERE sess->'passport'->>'user' = :userId AND sid IS DISTINCT FROM :keep`,
    {
      transaction,
      replacements: { userId: String(userId), keep },
    },
  );
}

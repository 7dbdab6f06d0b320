import { QueryTypes, type Transaction } from 'sequelize';
import type { Parts } from '../../parts.ts';

/** All-sites administrators who can still sign in, without one person; locked so that two cannot leave at once. */
export async function countOtherAdministrators(
  parts: Pick<Parts, 'sequelize'>,
  userId: number,
  transaction: Transaction,
): Promise<number> {
  const rows = await parts.sequelize.query<{ id: number }>(
    `SELECT m.id FROM memberships m JOIN users u ON u.id = m.user_id
     WHERE m.role = 'administrator' AND m.site_id IS NULL AND m.ended_at IS NULL AND u.deactivated_at IS NULL AND u.id <> :userId
     FOR UPDATE OF m`,
    { transaction, type: QueryTypes.SELECT, replacements: { userId } },
  );
  return rows.length;
}

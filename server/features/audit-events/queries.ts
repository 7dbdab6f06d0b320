import { QueryTypes, type Transaction } from 'sequelize';
import type { Sequelize } from 'sequelize';

/** One lock for the chain; any constant works as long as nothing else uses it. */
const chainLock = 4_280_001;

export interface ChainHead {
  sequence: number;
  hash: string;
}

/** Start of the chain: what the first event takes as the hash before it. */
export const genesisHash = '0'.repeat(64);

/** Takes the chain for the rest of the transaction and reads its last link. */
export async function takeChainHead(sequelize: Sequelize, transaction: Transaction): Promise<ChainHead> {
  await sequelize.query('SELECT pg_advisory_xact_lock(:chainLock)', {
    transaction,
    replacements: { chainLock },
  });
  const [last] = await sequelize.query<{ sequence: string; hash: string }>(
    'SELECT sequence, hash FROM audit_events ORDER BY sequence DESC LIMIT 1',
    { transaction, type: QueryTypes.SELECT },
  );
  return last ? { sequence: Number(last.sequence), hash: last.hash } : { sequence: 0, hash: genesisHash };
}

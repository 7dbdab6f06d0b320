import type { Sequelize, Transaction } from 'sequelize';

/** A transaction whose `afterCommit` callbacks run once the change is durable, in order, and never otherwise. */
export type OpenTransaction = Transaction;

/**
 * Runs `work` in one transaction: all of it is kept, or none. Pass the transaction to every query inside; a
 * forgotten one waits for a second connection. What must happen only after the change is durable (a live event,
 * waking a job) is registered with `transaction.afterCommit(callback)`.
 *
 * Sequelize would also call these callbacks after a commit that failed, hence the list kept here. A callback that
 * throws cannot undo what is committed: it is reported as a process warning and the others still run.
 */
export async function inTransaction<T>(
  sequelize: Sequelize,
  work: (transaction: OpenTransaction) => Promise<T>,
): Promise<T> {
  const callbacks: (() => Promise<void>)[] = [];
  const result = await sequelize.transaction(async (transaction) => {
    transaction.afterCommit = (callback) => {
      callbacks.push(async () => callback(transaction));
    };
    return work(transaction);
  });
  for (const callback of callbacks) {
    await callback().catch((error: unknown) => {
      process.emitWarning(error instanceof Error ? error : String(error));
    });
  }
  return result;
}

import pg from 'pg';

/**
 * A pool that outlives a restart of the database. pg reports the end of a connection as an error event: on the pool
 * while the connection is idle, on the connection itself while somebody has it, where nobody listens and the process
 * would end. Whoever has it learns of it from the query that fails.
 */
export function openPool(options: pg.PoolConfig, onLost: (error: Error) => void): pg.Pool {
  const pool = new pg.Pool(options);
  pool.on('error', onLost);
  pool.on('connect', (client) => client.on('error', onLost));
  return pool;
}

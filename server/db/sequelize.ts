/** The one way to the database. Who connects owns the connection and passes it on; there is no global. */
import pg from 'pg';
import { Sequelize } from 'sequelize';
import { initModels } from './models/index.ts';

/**
 * 64-bit columns (message numbers, the audit sequence, counts) arrive as text unless told otherwise. None of ours
 * exceeds what a number holds exactly: the wire refuses larger message numbers.
 */
function parseExactInteger(text: string): number {
  const value = Number(text);
  if (!Number.isSafeInteger(value))
    throw new RangeError(`${text} is too large to be held exactly as a number.`);
  return value;
}

interface ConnectionOptions {
  /** Connections this process may open; raw readers and writers have pools of their own. */
  maxConnections?: number;
  applicationName?: string;
  logSql?: (sql: string) => void;
}

/**
 * Opens a pool and ties the models to it. Call it once in a process (a second call moves the models over), and
 * `close()` it at the end. Nothing is sent until the first query.
 */
export function connectDatabase(
  url: string,
  { maxConnections = 10, applicationName = 'saltmark', logSql }: ConnectionOptions = {},
): Sequelize {
  pg.types.setTypeParser(pg.types.builtins.INT8, parseExactInteger);
  const sequelize = new Sequelize(url, {
    dialectModule: pg,
    dialectOptions: { application_name: applicationName, keepAlive: true },
    pool: { max: maxConnections, acquire: 15_000, idle: 30_000 },
    logging: logSql ?? false,
  });
  initModels(sequelize);
  return sequelize;
}

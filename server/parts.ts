/** What every service is given: the running parts of this process. No globals, so that tests build their own. */
import type { Sequelize } from 'sequelize';
import type { Config } from './config.ts';
import type { Clock } from './lib/clock.ts';
import type { Logger } from './lib/logger.ts';
import type { Broadcast } from './realtime/broadcast.ts';

export interface HealthProbe {
  name: string;
  check: () => Promise<{ up: boolean; detail?: string }>;
}

export interface Parts {
  config: Config;
  sequelize: Sequelize;
  clock: Clock;
  log: Logger;
  broadcast: Broadcast;
  /** Each started part adds its own; /api/health asks them all. */
  health: HealthProbe[];
}

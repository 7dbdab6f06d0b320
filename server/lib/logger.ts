import { pino, type Logger } from 'pino';

export type { Logger };

/** JSON lines on standard output; secrets never reach a line. */
export function createLogger(level: string): Logger {
  return pino({
    level,
    redact: {
      paths: ['req.headers.cookie', 'req.headers.authorization', '*.password', '*.secret'],
      remove: true,
    },
  });
}

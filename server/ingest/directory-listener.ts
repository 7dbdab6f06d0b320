/** Hears what other connections have changed in the directory tables, from the database's own triggers, at commit. */
import pg from 'pg';
import type { Logger } from '../lib/logger.ts';

const channel = 'saltmark_directory';
const reconnectMs = 1000;

export interface DirectoryListener {
  stop: () => Promise<void>;
}

/**
 * Calls `onChange` with the trigger's words, and `onGap` after every connection but the first: what was said
 * meanwhile was missed. Resolves when it listens.
 */
export async function listenForChanges(options: {
  url: string;
  log: Logger;
  onChange: (what: string) => void;
  onGap: () => void;
}): Promise<DirectoryListener> {
  const { url, log, onChange, onGap } = options;
  let client: pg.Client | null = null;
  let timer: NodeJS.Timeout | null = null;
  let isStopped = false;

  const connect = async (): Promise<void> => {
    const next = new pg.Client({
      connectionString: url,
      application_name: 'saltmark ingest directory',
      keepAlive: true,
    });
    let isLost = false;
    const lose = (error: unknown): void => {
      if (isLost || isStopped) return;
      isLost = true;
      log.warn({ err: error }, 'the directory listener lost its connection');
      next.end().catch(() => {});
      reconnectLater();
    };
    next.on('error', lose);
    next.on('end', () => lose(new Error('connection ended')));
    next.on('notification', ({ payload }) => onChange(payload ?? ''));
    try {
      await next.connect();
      await next.query(`listen ${channel}`);
      client = next;
    } catch (error) {
      isLost = true;
      next.end().catch(() => {});
      throw error;
    }
  };

  const reconnectLater = (): void => {
    timer = setTimeout(() => {
      connect().then(onGap, () => {
        if (!isStopped) reconnectLater();
      });
    }, reconnectMs);
  };

  await connect();
  return {
    stop: async () => {
      isStopped = true;
      if (timer) clearTimeout(timer);
      await client?.end().catch(() => {});
    },
  };
}

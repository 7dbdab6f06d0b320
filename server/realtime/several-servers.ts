import { createAdapter } from '@socket.io/redis-adapter';
import { createClient } from 'redis';
import type { Logger } from '../lib/logger.ts';
import type { RealtimeServer } from './broadcast.ts';

/** Several servers speak to one audience: live updates travel between them over Redis. */
export async function joinServers(
  io: RealtimeServer,
  url: string,
  log: Logger,
): Promise<{ name: string; stop: () => Promise<void> }> {
  const publisher = createClient({ url });
  const subscriber = publisher.duplicate();
  for (const client of [publisher, subscriber])
    client.on('error', (error: unknown) => log.warn({ err: error }, 'redis'));
  await Promise.all([publisher.connect(), subscriber.connect()]);
  io.adapter(createAdapter(publisher, subscriber));
  return {
    name: 'redis',
    stop: async () => {
      await Promise.all([publisher.close(), subscriber.close()]);
    },
  };
}

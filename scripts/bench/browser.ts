/** One signed-in page that watches a site over socket.io. */
import { io } from 'socket.io-client';
import type { ReadingsUpdate } from '../../shared/contracts/realtime.ts';
import { viewer } from './plant.ts';

export interface Page {
  close: () => void;
}

export async function openPage(
  httpUrl: string,
  siteId: number,
  onReadings: (update: ReadingsUpdate) => void,
): Promise<Page> {
  const answer = await fetch(`${httpUrl}/api/sessions`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(viewer),
  });
  if (answer.status !== 201) throw new Error(`Sign-in was answered ${answer.status}: ${await answer.text()}`);
  const cookie = answer.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ');
  const socket = io(httpUrl, { transports: ['websocket'], extraHeaders: { cookie }, reconnection: false });
  await new Promise<void>((resolve, reject) => {
    socket.once('connect', resolve);
    socket.once('connect_error', reject);
  });
  socket.on('readings', onReadings);
  const joined = (await socket.timeout(5000).emitWithAck('watch', { site: siteId })) as boolean;
  if (!joined) throw new Error('The page was not let into the site.');
  return { close: () => void socket.close() };
}

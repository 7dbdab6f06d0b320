/** Who may join what. A browser asks to watch a site or a probe; the policy answers before the room does. */
import type { Server as HttpServer } from 'node:http';
import type { Request, RequestHandler } from 'express';
import { Server } from 'socket.io';
import type { ClientToServer, ServerToClient, WatchTarget } from '../../shared/contracts/realtime.ts';
import { siteOfProbe } from '../features/probes/service.ts';
import { actorOf } from '../http/authenticate.ts';
import type { SessionKit } from '../http/authenticate.ts';
import { readableSites, roleAt, type Actor } from '../http/actor.ts';
import type { Parts } from '../parts.ts';
import { rooms, type RealtimeServer } from './broadcast.ts';

/** Before Parts exist: the bare server that broadcast writes to. */
export function createRealtimeServer(): RealtimeServer {
  return new Server<ClientToServer, ServerToClient>({
    transports: ['websocket', 'polling'],
    serveClient: false,
    maxHttpBufferSize: 16 * 1024,
    allowRequest: (request, answer) => {
      const origin = request.headers.origin;
      answer(null, origin === undefined || hostOf(origin) === request.headers.host);
    },
  });
}

const hostOf = (origin: string): string | null => (URL.canParse(origin) ? new URL(origin).host : null);

/** Runs an express middleware on the handshake only; later packets of the connection pass. */
const onHandshake =
  (middleware: RequestHandler): RequestHandler =>
  (request, response, next) => {
    const isHandshake = (request as Request & { _query?: { sid?: string } })._query?.sid === undefined;
    if (isHandshake) void middleware(request, response, next);
    else next();
  };

/** Frames that may wait for one page; a page on a slow line is ended beyond, connects again and fetches anew. */
const maxWaitingFrames = 4000;
const lookForSlowPagesMs = 2000;

/** What waits for a browser lies in this process: without a limit one sleeping page would grow for ever. */
function endSlowPages(io: RealtimeServer): NodeJS.Timeout {
  return setInterval(() => {
    for (const socket of io.sockets.sockets.values()) {
      const { writeBuffer } = socket.conn as unknown as { writeBuffer: readonly unknown[] };
      if (writeBuffer.length > maxWaitingFrames) socket.conn.close(true);
    }
  }, lookForSlowPagesMs).unref();
}

export function openGateway(io: RealtimeServer, http: HttpServer, parts: Parts, sessions: SessionKit): void {
  io.attach(http);
  const watch = endSlowPages(io);
  http.once('close', () => clearInterval(watch));
  io.engine.use(onHandshake(sessions.middleware));
  io.engine.use(onHandshake(sessions.passport));
  io.use((socket, next) => {
    const request = socket.request as Request;
    request.id = 'socket';
    actorOf(parts, request).then(
      (actor) => {
        if (!actor) return next(new Error('sessions.required'));
        (socket.data as { actor: Actor }).actor = actor;
        next();
      },
      (error: unknown) => next(error as Error),
    );
  });
  io.on('connection', (socket) => {
    const { actor } = socket.data as { actor: Actor };
    void socket.join([rooms.everyone, rooms.user(actor.userId), ...siteRooms(actor)]);
    socket.on('watch', (target, answer) => {
      roomOf(parts, actor, target).then(
        async (room) => {
          if (room) await socket.join(room);
          if (typeof answer === 'function') answer(room !== null);
        },
        (error: unknown) => parts.log.warn({ err: error }, 'watch refused'),
      );
    });
    socket.on('unwatch', (target) => {
      const room = plainRoom(target);
      if (room) void socket.leave(room);
    });
  });
}

const siteRooms = (actor: Actor): string[] => readableSites(actor)?.map(rooms.site) ?? [rooms.allSites];

function plainRoom(target: WatchTarget | undefined): string | null {
  if (target && 'site' in target && Number.isInteger(target.site)) return rooms.siteReadings(target.site);
  if (target && 'probe' in target && Number.isInteger(target.probe)) return rooms.probe(target.probe);
  return null;
}

async function roomOf(parts: Parts, actor: Actor, target: WatchTarget): Promise<string | null> {
  const room = plainRoom(target);
  if (!room) return null;
  const siteId = 'site' in target ? target.site : await siteOfProbe(parts, target.probe);
  return siteId !== null && roleAt(actor, siteId) !== null ? room : null;
}

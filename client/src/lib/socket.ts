import { io, type Socket } from 'socket.io-client';
import type { ClientToServer, ServerToClient } from '../../../shared/contracts/realtime.ts';

export type LiveSocket = Socket<ServerToClient, ClientToServer>;

/**
 * One socket for the whole page, at module level: an effect that made its own would connect twice under StrictMode.
 * It connects after sign-in. Polling is the way in where a proxy refuses websockets.
 */
export const socket: LiveSocket = io({
  autoConnect: false,
  transports: ['websocket', 'polling'],
  withCredentials: true,
});

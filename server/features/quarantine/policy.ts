import type { Policy } from '../../http/authorise.ts';

/** Raw device messages are the administrator’s. */
export const quarantinePolicy = {
  read: ['administrator'],
  resolve: ['administrator'],
} satisfies Policy;

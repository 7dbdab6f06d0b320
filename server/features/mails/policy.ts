import type { Policy } from '../../http/authorise.ts';

/** The outbox may hold one-time links. */
export const mailPolicy = {
  read: ['administrator'],
} satisfies Policy;

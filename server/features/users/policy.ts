import type { Policy } from '../../http/authorise.ts';

/** People are the administrator’s. */
export const userPolicy = {
  read: ['administrator'],
  create: ['administrator'],
  change: ['administrator'],
  deactivate: ['administrator'],
} satisfies Policy;

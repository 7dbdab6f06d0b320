import type { Policy } from '../../http/authorise.ts';

/** Roles are granted by the administrator of the site concerned. */
export const membershipPolicy = {
  read: ['administrator'],
  grant: ['administrator'],
  end: ['administrator'],
} satisfies Policy;

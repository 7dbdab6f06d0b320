import { everyRole, type Policy } from '../../http/authorise.ts';

/** Credentials are the administrator’s alone. */
export const devicePolicy = {
  read: everyRole,
  issue: ['administrator'],
  replace: ['administrator'],
  revoke: ['administrator'],
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Reference instruments travel between sites, so that rights at any one site count. */
export const instrumentPolicy = {
  read: everyRole,
  create: ['manager'],
  change: ['manager'],
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Settings hold for the whole organisation. */
export const settingPolicy = {
  read: everyRole,
  change: ['administrator'],
} satisfies Policy;

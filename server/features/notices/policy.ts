import { everyRole, type Policy } from '../../http/authorise.ts';

/** Integrity notices: everybody sees them, who answers for the probe closes them. */
export const noticePolicy = {
  read: everyRole,
  close: ['manager', 'administrator'],
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Evidence is readable by every role of the site. */
export const checkPolicy = {
  read: everyRole,
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Readings are readable by every role of the site. */
export const readingPolicy = {
  read: everyRole,
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Prompts are raised and closed by what happens to a probe; nobody sets or removes one by hand. */
export const promptPolicy = {
  read: everyRole,
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** A procedure binds every site, so that only a role at all sites may issue one. */
export const procedurePolicy = {
  read: everyRole,
  issue: ['manager', 'administrator'],
} satisfies Policy;

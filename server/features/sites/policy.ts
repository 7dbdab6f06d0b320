import { everyRole, type Policy } from '../../http/authorise.ts';

/** Who may do what with a site; `create` is asked organisation-wide. */
export const sitePolicy = {
  read: everyRole,
  create: ['administrator'],
  change: ['manager', 'administrator'],
  addArea: ['manager', 'administrator'],
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Requirements are the manager’s; holding a point is whoever stands beside it. */
export const pointPolicy = {
  read: everyRole,
  create: ['manager', 'administrator'],
  change: ['manager', 'administrator'],
  retire: ['manager', 'administrator'],
  hold: ['technician', 'manager', 'operator'],
  release: ['technician', 'manager', 'operator'],
} satisfies Policy;

import { everyRole, type Policy } from '../../http/authorise.ts';

/** Who may do what with a probe at the site where it is kept. */
export const probePolicy = {
  read: everyRole,
  register: ['manager', 'administrator'],
  change: ['manager', 'administrator'],
  install: ['technician', 'manager', 'administrator'],
  move: ['technician', 'manager', 'administrator'],
  remove: ['technician', 'manager', 'administrator'],
  retire: ['manager', 'administrator'],
  addNote: ['technician', 'manager', 'operator', 'administrator'],
} satisfies Policy;

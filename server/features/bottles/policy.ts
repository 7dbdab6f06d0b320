import { everyRole, type Policy } from '../../http/authorise.ts';

/** Bottles are handled by whoever calibrates. */
export const bottlePolicy = {
  read: everyRole,
  receive: ['technician', 'manager'],
  open: ['technician', 'manager'],
  setRemaining: ['technician', 'manager'],
  discard: ['technician', 'manager'],
} satisfies Policy;

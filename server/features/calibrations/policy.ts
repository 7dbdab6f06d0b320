import { everyRole, type Policy } from '../../http/authorise.ts';

/** Who calibrates may never approve own work; the service adds that, a role alone cannot say it. */
export const calibrationPolicy = {
  read: everyRole,
  perform: ['technician', 'manager'],
  handOver: ['technician', 'manager'],
  stop: ['technician', 'manager'],
  override: ['manager'],
  review: ['manager'],
  amend: ['technician', 'manager'],
  command: ['technician', 'manager'],
} satisfies Policy;

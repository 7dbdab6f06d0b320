import { everyRole, type Policy } from '../../http/authorise.ts';

/** Anybody who calibrates may stop a lot; only a manager lets it back in. */
export const standardPolicy = {
  read: everyRole,
  create: ['manager'],
  release: ['manager'],
  recall: ['manager'],
  quarantine: ['technician', 'manager'],
} satisfies Policy;

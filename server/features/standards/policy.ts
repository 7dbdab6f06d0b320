import { everyRole, type Policy } from '../../http/authorise.ts';

/** Anybody who calibrates may stop a lot or make one in house; only a manager lets it in. */
export const standardPolicy = {
  read: everyRole,
  create: ['manager'],
  prepare: ['technician', 'manager'],
  attachCertificate: ['manager'],
  release: ['manager'],
  recall: ['manager'],
  quarantine: ['technician', 'manager'],
} satisfies Policy;

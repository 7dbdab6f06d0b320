import type { Policy } from '../../http/authorise.ts';

/** Who reads the audit trail of a site. */
export const auditEventPolicy = {
  read: ['manager', 'auditor', 'administrator'],
} satisfies Policy;

import type { AuditEventView } from '../../../shared/contracts/audit-events.ts';
import type { AuditEvent } from '../../db/models/index.ts';
import { chainedEventOf } from './verify.ts';

export const presentAuditEvent = (row: AuditEvent): AuditEventView => ({
  ...chainedEventOf(row),
  hash: row.hash,
});

import type { Mail as View } from '../../../shared/contracts/mails.ts';
import type { Mail } from '../../db/models/index.ts';

export const presentMail = (row: Mail): View => ({
  id: row.id,
  to: row.toAddress,
  subject: row.subject,
  textBody: row.textBody,
  kind: row.kind,
  createdAt: row.createdAt.toISOString(),
  sentAt: row.sentAt?.toISOString() ?? null,
  attempts: row.attempts,
  lastError: row.lastError,
});

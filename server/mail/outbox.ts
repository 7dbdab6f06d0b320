/** Mail is written in the transaction that causes it and sent by a job: no change without its mail, no mail without its change. */
import type { Transaction } from 'sequelize';
import { Mail } from '../db/models/index.ts';
import type { Parts } from '../parts.ts';

export interface NewMail {
  to: string;
  subject: string;
  text: string;
  /** What caused it, for the viewer: `users.welcome`. */
  kind: string;
  /** The same key is queued once, ever. */
  dedupeKey?: string;
}

export async function queueMail(parts: Parts, transaction: Transaction, mail: NewMail): Promise<void> {
  await Mail.bulkCreate(
    [
      {
        toAddress: mail.to,
        subject: mail.subject,
        textBody: mail.text,
        kind: mail.kind,
        dedupeKey: mail.dedupeKey ?? null,
        createdAt: parts.clock.now(),
        sendAfter: parts.clock.now(),
        htmlBody: null,
        lastError: null,
        sentAt: null,
      },
    ],
    { transaction, ignoreDuplicates: true },
  );
  (transaction as Transaction & { afterCommit: (callback: () => void) => void }).afterCommit(() =>
    parts.broadcast.changed({ slice: 'mails', id: 0, kind: 'created' }, null),
  );
}

/** Sends what waits in the outbox, each message once. Without SMTP_URL the outbox itself is the mailbox (local viewer). */
import { createTransport, type Transporter } from 'nodemailer';
import { Mail } from '../db/models/index.ts';
import { inTransaction } from '../db/transaction.ts';
import type { Parts } from '../parts.ts';
import { takeDueMails, type DueMail } from './queries.ts';

const mailsPerRun = 20;
const firstRetryMs = 60_000;

export interface MailSender {
  /** Sends what is due; answers how many went out. */
  sendDue: () => Promise<number>;
  stop: () => void;
}

export function createMailSender(parts: Parts): MailSender {
  const { smtpUrl, mailFrom } = parts.config;
  const transport: Transporter | null = smtpUrl ? createTransport(smtpUrl) : null;

  const deliver = async (mail: DueMail): Promise<string | null> => {
    if (!transport) return null;
    try {
      // The row's own id: a receiver that sees a repeat after a crash can drop it (RFC 5322 §3.6.4).
      const messageId = `<mail-${mail.id}@saltmark.invalid>`;
      await transport.sendMail({
        from: mailFrom,
        to: mail.toAddress,
        subject: mail.subject,
        text: mail.textBody,
        messageId,
      });
      return null;
    } catch (error) {
      return error instanceof Error ? error.message : String(error);
    }
  };

  const sendOne = (): Promise<boolean> =>
    inTransaction(parts.sequelize, async (transaction) => {
      const now = parts.clock.now();
      const [mail] = await takeDueMails(parts, transaction, now, 1);
      if (!mail) return false;
      const failure = await deliver(mail);
      const attempts = mail.attempts + 1;
      const outcome = failure
        ? {
            attempts,
            lastError: failure.slice(0, 1000),
            sendAfter: new Date(now.getTime() + firstRetryMs * 2 ** (attempts - 1)),
          }
        : { attempts, lastError: null, sentAt: now };
      await Mail.update(outcome, { where: { id: mail.id }, transaction });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'mails', id: mail.id, kind: 'changed' }, null),
      );
      return true;
    });

  return {
    sendDue: async () => {
      let sent = 0;
      while (sent < mailsPerRun && (await sendOne())) sent += 1;
      return sent;
    },
    stop: () => transport?.close(),
  };
}

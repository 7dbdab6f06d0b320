import { QueryTypes, type Transaction } from 'sequelize';
import type { Parts } from '../parts.ts';

export interface DueMail {
  id: number;
  toAddress: string;
  subject: string;
  textBody: string;
  attempts: number;
}

/** Locks the oldest unsent mails that are due; a second sender skips them. */
export const takeDueMails = (
  parts: Pick<Parts, 'sequelize'>,
  transaction: Transaction,
  now: Date,
  most: number,
): Promise<DueMail[]> =>
  parts.sequelize.query<DueMail>(
    `SELECT id, to_address AS "toAddress", subject, text_body AS "textBody", attempts FROM mails
     WHERE sent_at IS NULL AND send_after <= :now AND attempts < :giveUpAfter
     ORDER BY id LIMIT :most FOR UPDATE SKIP LOCKED`,
    { transaction, type: QueryTypes.SELECT, replacements: { now, most, giveUpAfter } },
  );

/** About two days of retries, by the doubling below. */
export const giveUpAfter = 12;

import { SMTPServer } from 'smtp-server';
import { simpleParser, type ParsedMail } from 'mailparser';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { Mail } from '../../server/db/models/index.ts';
import { inTransaction } from '../../server/db/transaction.ts';
import { queueMail } from '../../server/mail/outbox.ts';
import { createMailSender, type MailSender } from '../../server/mail/sender.ts';
import { startTestApp, type TestApp } from '../support/app.ts';

let app: TestApp;
let post: SMTPServer;
let sender: MailSender;
const received: ParsedMail[] = [];
let refuses = false;

beforeAll(async () => {
  post = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData: (stream, _session, done) => {
      simpleParser(stream).then(
        (mail) => {
          if (refuses) return done(Object.assign(new Error('mailbox full'), { responseCode: 452 }));
          received.push(mail);
          done();
        },
        (error: Error) => done(error),
      );
    },
  });
  const port = await new Promise<number>((resolve) => {
    const server = post.listen(0, '127.0.0.1', () => resolve((server.address() as { port: number }).port));
  });
  app = await startTestApp({ SMTP_URL: `smtp://127.0.0.1:${port}` });
  sender = createMailSender(app.parts);
});
afterAll(async () => {
  sender.stop();
  await new Promise<void>((resolve) => post.close(resolve));
  await app.stop();
});

const queue = (subject: string, dedupeKey?: string) =>
  inTransaction(app.sequelize, (transaction) =>
    queueMail(app.parts, transaction, {
      to: 'manager@plant.example',
      subject,
      text: '0.1 mol/kg: 12 825 µS/cm',
      kind: 'tests',
      ...(dedupeKey && { dedupeKey }),
    }),
  );

it('a queued mail reaches the mail server once, however many senders look', async () => {
  await queue('Due on Friday');
  const other = createMailSender(app.parts);
  await Promise.all([sender.sendDue(), other.sendDue()]);
  other.stop();
  expect(received.map((mail) => mail.subject)).toEqual(['Due on Friday']);
  expect(received[0]!.text).toContain('12 825 µS/cm');
  expect(await Mail.findAll()).toMatchObject([{ attempts: 1, lastError: null }]);
});

it('a cause that repeats sends one mail', async () => {
  await queue('Overdue', 'probe 7 overdue');
  await queue('Overdue', 'probe 7 overdue');
  expect(await Mail.count({ where: { subject: 'Overdue' } })).toBe(1);
});

it('a mail that fails is tried again later, with the reason kept, and then leaves', async () => {
  await sender.sendDue();
  received.length = 0;
  refuses = true;
  await queue('Later');
  await sender.sendDue();
  const row = (await Mail.findOne({ where: { subject: 'Later' } }))!;
  expect(row.lastError).toMatch(/mailbox full/);
  expect(row.sentAt).toBeNull();
  refuses = false;
  expect(await sender.sendDue()).toBe(0);
  app.clock.advance(61_000);
  expect(await sender.sendDue()).toBe(1);
  expect(received.map((mail) => mail.subject)).toEqual(['Later']);
});

it('a mail of a change that was undone is never sent', async () => {
  const undone = inTransaction(app.sequelize, async (transaction) => {
    await queueMail(app.parts, transaction, {
      to: 'a@plant.example',
      subject: 'Ghost',
      text: '',
      kind: 'tests',
    });
    throw new Error('undone');
  });
  await expect(undone).rejects.toThrow('undone');
  expect(await sender.sendDue()).toBe(0);
});

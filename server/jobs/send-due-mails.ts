/** Sends what waits in the outbox. */
import { createMailSender } from '../mail/sender.ts';
import type { Job } from './job.ts';

export const sendDueMails: Job = {
  name: 'send-due-mails',
  schedule: '*/10 * * * * *',
  runsAtStart: false,
  run: async ({ parts }) => {
    const sender = createMailSender(parts);
    try {
      await sender.sendDue();
    } finally {
      sender.stop();
    }
  },
};

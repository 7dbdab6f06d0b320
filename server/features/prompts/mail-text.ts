/** Pure: what a manager is written. What, where, since when, what to do, and a link; it says nothing that is secret. */
import type { PromptKind } from '../../../shared/contracts/vocabulary.ts';
import { formatDate } from '../../../shared/format/dates.ts';
import type { DueRow } from './queries.ts';

export interface PromptMail {
  subject: string;
  text: string;
}

export function promptMail(
  kind: PromptKind,
  due: DueRow & { dueOn: string },
  name: string,
  publicUrl: string,
): PromptMail {
  const day = formatDate(due.dueOn);
  const what =
    kind === 'overdue'
      ? `The calibration of ${due.pointName} (probe ${due.probeTag}) at ${due.siteName} was due on ${day} and has not been done. Until it is, operators see "fitness not confirmed" beside the reading.`
      : `The calibration of ${due.pointName} (probe ${due.probeTag}) at ${due.siteName} is due on ${day}.`;
  return {
    subject:
      kind === 'overdue'
        ? `Overdue since ${day}: ${due.pointName}, ${due.siteName}`
        : `Due on ${day}: ${due.pointName}, ${due.siteName}`,
    text: [
      `Hello ${name},`,
      '',
      what,
      '',
      'Plan a visit, or look at what the probe did since the last one:',
      `${publicUrl}/probes/${due.probeId}`,
      '',
      'This is a prompt to plan work and no alarm. It is sent once.',
    ].join('\n'),
  };
}

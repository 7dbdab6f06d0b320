import type { Mail } from '../../../../shared/contracts/mails.ts';
import { formatDateTime } from '../../../../shared/format/dates.ts';
import { formatCount } from '../../../../shared/format/numbers.ts';

export interface TextPart {
  text: string;
  /** Set where the text is an address to follow. */
  href?: string;
}

/** Plain text with its web addresses set apart; the full stop after an address is not part of it. */
export function textWithLinks(text: string): TextPart[] {
  const parts: TextPart[] = [];
  let from = 0;
  for (const found of text.matchAll(/https?:\/\/[^\s<>"]+/g)) {
    const address = found[0].replace(/[.,;:!?)\]]+$/, '');
    if (found.index > from) parts.push({ text: text.slice(from, found.index) });
    parts.push({ text: address, href: address });
    from = found.index + address.length;
  }
  if (from < text.length) parts.push({ text: text.slice(from) });
  return parts;
}

/** Whether a mail has left, in words. */
export function mailState(mail: Pick<Mail, 'sentAt' | 'attempts' | 'lastError'>): {
  text: string;
  isNotable: boolean;
} {
  if (mail.sentAt) return { text: `left on ${formatDateTime(mail.sentAt)}`, isNotable: false };
  if (mail.attempts === 0) return { text: 'waits to leave', isNotable: false };
  const tried = formatCount(mail.attempts, 'attempt');
  return { text: `has not left after ${tried}: ${mail.lastError ?? 'no reason given'}`, isNotable: true };
}

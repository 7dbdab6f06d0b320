import { formatTime } from '../../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';

export interface SaveFacts {
  /** Of this run, not sent yet. */
  waiting: number;
  /** Of this run, not accepted by the server. */
  refused: number;
  lastSentAt: string | null;
  isSignedOut: boolean;
  /** False while the phone hears nothing from the server. */
  isOnline: boolean;
  timeZone: string;
}

/** What is saved where, in words: stands right above the button, always. */
export function saveWords(facts: SaveFacts): string {
  const { waiting, refused, lastSentAt, isSignedOut, isOnline, timeZone } = facts;
  const count = formatNumber(waiting, { decimals: 0 });
  const refusals = refused > 0 ? ` ${formatNumber(refused, { decimals: 0 })} not accepted, see above.` : '';
  if (waiting > 0 && isSignedOut)
    return `Saved on this phone, ${count} not yet sent: sign in again.${refusals}`;
  if (waiting > 0) return `Saved on this phone, ${count} not yet sent${refusals ? '.' + refusals : ''}`;
  if (refused > 0) return `Saved on this phone.${refusals}`;
  if (!isOnline) return 'No network. What you capture is saved on this phone.';
  return lastSentAt === null
    ? 'Everything is on the server'
    : `Saved on this phone and sent at ${formatTime(lastSentAt, { timeZone })}`;
}

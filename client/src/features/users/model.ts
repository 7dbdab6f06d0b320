import type { User } from '../../../../shared/contracts/users.ts';
import { formatDate, formatDateTime } from '../../../../shared/format/dates.ts';
import { listInWords, ROLE_LABELS } from '../../../../shared/format/labels.ts';
import { countInWords } from '../../../../shared/format/numbers.ts';

type Grant = User['grants'][number];

/** Whether a grant still counts on a day (`YYYY-MM-DD`); its last day is the day it ends on. */
export const isInForce = (grant: Grant, today: string): boolean =>
  grant.endsOn === null || grant.endsOn >= today;

/** `instrument manager, all sites` · `auditor, Lower Weir, until 31 Dec 2026` */
export function grantWords(grant: Grant, today: string): string {
  const where = grant.siteId === null ? 'all sites' : (grant.siteName ?? `site ${grant.siteId}`);
  const until = grant.endsOn
    ? `, ${isInForce(grant, today) ? 'until' : 'ended'} ${formatDate(grant.endsOn)}`
    : '';
  return `${ROLE_LABELS[grant.role]}, ${where}${until}`;
}

export interface PersonState {
  text: string;
  /** The person cannot work here as things are, or not for long. */
  isNotable: boolean;
}

/** Whether somebody can sign in, in words; the gravest reason first. */
export function personState(user: User, now: number): PersonState {
  const today = new Date(now).toISOString().slice(0, 10);
  if (user.deactivatedAt)
    return { text: `deactivated on ${formatDate(user.deactivatedAt)}`, isNotable: true };
  if (user.lockedUntil && Date.parse(user.lockedUntil) > now)
    return { text: `locked until ${formatDateTime(user.lockedUntil, { offset: true })}`, isNotable: true };
  if (!user.hasPassword) return { text: 'invited, has not set a password yet', isNotable: true };
  if (!user.grants.some((grant) => isInForce(grant, today)))
    return { text: 'has no role in force', isNotable: true };
  return {
    text: user.lastSignInAt
      ? `signed in last on ${formatDateTime(user.lastSignInAt, { offset: true })}`
      : 'has never signed in',
    isNotable: false,
  };
}

/** The situation of the people in a sentence. */
export function peopleSentence(users: readonly User[], now: number): { all: string; exception: string } {
  const active = users.filter((user) => user.deactivatedAt === null);
  const notable = active.filter((user) => personState(user, now).isNotable);
  const able = active.length - notable.length;
  const all = able === 1 ? 'One person can sign in.' : `${capital(countInWords(able))} people can sign in.`;
  if (notable.length === 0) return { all, exception: '' };
  const others = notable.length - 3;
  const names = notable.slice(0, 3).map((user) => user.name);
  if (others > 0) names.push(`${countInWords(others)} more`);
  return { all, exception: `${listInWords(names)} cannot, as things are.` };
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

import type { Session } from '../../../../shared/contracts/sessions.ts';
import { formatDate } from '../../../../shared/format/dates.ts';
import { ROLE_LABELS } from '../../../../shared/format/labels.ts';

/** The role as the rail names it: at the site in view, else the one for all sites, else the first there is. */
export function roleWords(session: Session, siteId: number | null): string {
  const { grants } = session;
  const grant =
    grants.find((one) => one.siteId !== null && one.siteId === siteId) ??
    grants.find((one) => one.siteId === null) ??
    grants[0];
  return grant ? ROLE_LABELS[grant.role] : 'no role';
}

/** One grant in words: role, where, and until when. */
export function grantWords(grant: Session['grants'][number]): string {
  const where = grant.siteId === null ? 'all sites' : (grant.siteName ?? `site ${grant.siteId}`);
  const until = grant.endsOn ? `, until ${formatDate(grant.endsOn)}` : '';
  return `${ROLE_LABELS[grant.role]}, ${where}${until}`;
}

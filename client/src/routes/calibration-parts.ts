import { useQuery } from '@tanstack/react-query';
import type { Session } from '../../../shared/contracts/sessions.ts';
import type { AreaTab } from '../components/layout/area-tabs.tsx';
import { sitesList } from '../features/sites/api.ts';
import { paths } from '../paths.ts';

/** Zone of each site's clock; UTC until the sites are known. */
export function useZoneOf(): (siteId: number) => string {
  const sites = useQuery(sitesList()).data?.items ?? [];
  return (siteId) => sites.find((site) => site.id === siteId)?.timeZone ?? 'UTC';
}

/** Whether this person works at the probes of a site. */
export const mayCalibrateAt = ({ grants }: Session, siteId: number): boolean =>
  grants.some(
    (grant) =>
      ['technician', 'manager'].includes(grant.role) && (grant.siteId === null || grant.siteId === siteId),
  );

/** Whether this person approves at a site. */
export const mayReviewAt =
  ({ grants }: Session) =>
  (siteId: number): boolean =>
    grants.some((grant) => grant.role === 'manager' && (grant.siteId === null || grant.siteId === siteId));

/** The review queue is shown to whoever approves somewhere. */
export function calibrationTabs({ grants }: Session): AreaTab[] {
  const today = { label: 'Today', to: paths.calibrations.to() };
  const isManager = grants.some((grant) => grant.role === 'manager');
  return isManager ? [today, { label: 'Review', to: paths.reviewCalibrations.to() }] : [today];
}

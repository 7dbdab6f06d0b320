import type { Session } from '../../../shared/contracts/sessions.ts';
import type { RailArea } from '../components/layout/app-shell.tsx';
import type { MenuItem } from '../components/ui/menu.tsx';
import { paths } from '../paths.ts';

/** The areas of the rail that this person has pages in; the site in view is kept on the way. */
export function areasFor(session: Session, siteId: number | null): RailArea[] {
  return [
    {
      label: 'Live',
      to: siteId === null ? paths.live.to() : paths.liveSite.to({ siteId }),
      under: [paths.live.pattern],
    },
    {
      label: 'Probes',
      to: paths.probes.to({ siteId }),
      under: [paths.probes.pattern, paths.points.pattern],
    },
    { label: 'Calibrations', to: paths.calibrations.to() },
    { label: 'Reference solutions', to: paths.standards.to() },
    ...(session.can.readAudit
      ? [{ label: 'Records', to: paths.auditTrail.to(), under: [paths.records.pattern] }]
      : []),
    { label: 'Settings', to: paths.settings.to() },
  ];
}

interface NamedSite {
  id: number;
  name: string;
}

/** The switcher of the rail: going to another site stays in the area one is in. */
export function siteItems(
  sites: readonly NamedSite[],
  siteId: number | null,
  pathname: string,
): { current: string; items: MenuItem[] } {
  const isInProbes = pathname === paths.probes.pattern;
  const to = (id: number | null) => {
    if (isInProbes) return paths.probes.to({ siteId: id });
    return id === null ? paths.live.to() : paths.liveSite.to({ siteId: id });
  };
  const everywhere: MenuItem[] =
    sites.length === 1 ? [] : [{ label: 'All sites', to: to(null), isCurrent: siteId === null }];
  return {
    current:
      sites.find((site) => site.id === siteId)?.name ?? (sites.length === 1 ? sites[0]!.name : 'All sites'),
    items: [
      ...everywhere,
      ...sites.map((site) => ({ label: site.name, to: to(site.id), isCurrent: site.id === siteId })),
    ],
  };
}

import { useQuery } from '@tanstack/react-query';
import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { ProbeList } from '../features/probes/components/probe-list.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { sitesList } from '../features/sites/api.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { idOf, useAddressFilters } from '../lib/use-address-filters.ts';
import { paths } from '../paths.ts';
import { probeTabs } from './area-pages.ts';

/** All probes of the sites one may see. */
export default function ProbesPage() {
  const { can } = useSession();
  const siteId = idOf(useAddressFilters().read('siteId')) ?? null;
  const sites = useQuery(sitesList()).data?.items ?? [];
  useShowSite(siteId);
  return (
    <>
      <AreaTabs label="Probes and points" items={probeTabs} />
      <ProbeList
        sites={sites}
        registerLink={
          can.registerProbe ? (
            <ButtonLink kind="primary" to={paths.newProbe.to({ siteId })}>
              Register a probe
            </ButtonLink>
          ) : null
        }
      />
    </>
  );
}

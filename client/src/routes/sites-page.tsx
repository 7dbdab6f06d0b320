import { ButtonLink } from '../components/ui/button.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { SiteList } from '../features/sites/components/site-list.tsx';
import { paths } from '../paths.ts';
import { SettingsTabs } from './settings-tabs.tsx';

export default function SitesPage() {
  const { can } = useSession();
  return (
    <>
      <SettingsTabs />
      <SiteList
        addLink={
          can.createSite ? (
            <ButtonLink kind="primary" to={paths.newSite.to()}>
              Add a site
            </ButtonLink>
          ) : null
        }
      />
    </>
  );
}

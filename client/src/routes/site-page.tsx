import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { siteDetail } from '../features/sites/api.ts';
import { SiteView } from '../features/sites/components/site-view.tsx';
import { paths } from '../paths.ts';
import { SettingsTabs } from './settings-tabs.tsx';
import { useIdParam } from './use-id-param.ts';

export default function SitePage() {
  const id = useIdParam('id');
  const query = useQuery({ ...siteDetail(id ?? 0), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.sites.to()} />;
  if (id === null) return unknown;
  return (
    <>
      <SettingsTabs />
      <Answer
        query={query}
        what="the site"
        loading={<LoadingFace label="Fetching the site" />}
        missing={unknown}
      >
        {(site) => <SiteView key={site.id} site={site} />}
      </Answer>
    </>
  );
}

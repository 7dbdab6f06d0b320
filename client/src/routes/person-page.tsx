import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { Grants } from '../features/memberships/components/grants.tsx';
import { sitesList } from '../features/sites/api.ts';
import { userDetail } from '../features/users/api.ts';
import { PersonView } from '../features/users/components/person-view.tsx';
import { paths } from '../paths.ts';
import { SettingsTabs } from './settings-tabs.tsx';
import { useIdParam } from './use-id-param.ts';

export default function PersonPage() {
  const id = useIdParam('id');
  const query = useQuery({ ...userDetail(id ?? 0), enabled: id !== null });
  const sites = useQuery(sitesList()).data?.items ?? [];
  const unknown = <UnknownAddress home={paths.people.to()} />;
  if (id === null) return unknown;
  return (
    <>
      <SettingsTabs />
      <Answer
        query={query}
        what="the person"
        loading={<LoadingFace label="Fetching the person" />}
        missing={unknown}
      >
        {(user) => <PersonView key={user.id} user={user} grants={<Grants user={user} sites={sites} />} />}
      </Answer>
    </>
  );
}

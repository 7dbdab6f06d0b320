import { ButtonLink } from '../components/ui/button.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { PeopleList } from '../features/users/components/people-list.tsx';
import { paths } from '../paths.ts';
import { SettingsTabs } from './settings-tabs.tsx';

export default function PeoplePage() {
  const { can } = useSession();
  return (
    <>
      <SettingsTabs />
      <PeopleList
        addLink={
          can.managePeople ? (
            <ButtonLink kind="primary" to={paths.newPerson.to()}>
              Add a person
            </ButtonLink>
          ) : null
        }
      />
    </>
  );
}

import { NewPersonForm } from '../features/users/components/new-person-form.tsx';
import { SettingsTabs } from './settings-tabs.tsx';

export default function NewPersonPage() {
  return (
    <>
      <SettingsTabs />
      <NewPersonForm />
    </>
  );
}

import { Organisation } from '../features/settings/components/organisation.tsx';
import { SettingsTabs } from './settings-tabs.tsx';

export default function OrganisationPage() {
  return (
    <>
      <SettingsTabs />
      <Organisation />
    </>
  );
}

import { NewSiteForm } from '../features/sites/components/new-site-form.tsx';
import { SettingsTabs } from './settings-tabs.tsx';

export default function NewSitePage() {
  return (
    <>
      <SettingsTabs />
      <NewSiteForm />
    </>
  );
}

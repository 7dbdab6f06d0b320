import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { paths } from '../paths.ts';
import { settingsPages } from './area-pages.ts';

/** The pages of Settings that this person may open, above each of them. */
export function SettingsTabs() {
  return (
    <AreaTabs
      label="Settings"
      items={settingsPages(useSession())}
      home={{ label: 'Settings', to: paths.settings.to() }}
    />
  );
}

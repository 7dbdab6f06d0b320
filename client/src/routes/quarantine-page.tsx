import { NoticeList } from '../features/notices/components/notice-list.tsx';
import { QuarantineList } from '../features/quarantine/components/quarantine-list.tsx';
import { SettingsTabs } from './settings-tabs.tsx';

export default function QuarantinePage() {
  return (
    <>
      <SettingsTabs />
      <QuarantineList />
      <NoticeList />
    </>
  );
}

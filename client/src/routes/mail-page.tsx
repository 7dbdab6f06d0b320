import { Outbox } from '../features/mails/components/outbox.tsx';
import { SettingsTabs } from './settings-tabs.tsx';

export default function MailPage() {
  return (
    <>
      <SettingsTabs />
      <Outbox />
    </>
  );
}

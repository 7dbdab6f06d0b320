import { ProcedureList } from '../features/procedures/components/procedure-list.tsx';
import { SettingsTabs } from './settings-tabs.tsx';

export default function ProceduresPage() {
  return (
    <>
      <SettingsTabs />
      <ProcedureList />
    </>
  );
}

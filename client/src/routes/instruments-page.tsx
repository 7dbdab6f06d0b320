import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { InstrumentList } from '../features/instruments/components/instrument-list.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { paths } from '../paths.ts';
import { standardTabs } from './area-pages.ts';

export default function InstrumentsPage() {
  const { can } = useSession();
  return (
    <>
      <AreaTabs label="Reference solutions" items={standardTabs} />
      <InstrumentList
        addLink={
          can.createInstrument ? (
            <ButtonLink kind="primary" to={paths.newInstrument.to()}>
              Register an instrument
            </ButtonLink>
          ) : null
        }
      />
    </>
  );
}

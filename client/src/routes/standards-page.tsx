import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { LotList } from '../features/standards/components/lot-list.tsx';
import { paths } from '../paths.ts';
import { standardTabs } from './area-pages.ts';

export default function StandardsPage() {
  const { can } = useSession();
  return (
    <>
      <AreaTabs label="Reference solutions" items={standardTabs} />
      <LotList
        addLink={
          <div className="page-buttons">
            {can.createStandard ? (
              <ButtonLink kind="primary" to={paths.newStandard.to()}>
                Register a lot
              </ButtonLink>
            ) : null}
            {can.prepareStandard ? (
              <>
                <ButtonLink to={paths.prepareStandard.to()}>Prepare by weighing</ButtonLink>
                <ButtonLink to={paths.diluteStandard.to()}>Dilute a lot</ButtonLink>
              </>
            ) : null}
          </div>
        }
      />
    </>
  );
}

import { ButtonLink } from '../components/ui/button.tsx';
import { useHoldDialogs } from '../features/points/components/hold-dialogs.tsx';
import { holdableOf } from '../features/readings/live-row.ts';
import { LiveAll } from '../features/readings/components/live-all.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { paths } from '../paths.ts';

/** All sites. */
export default function LivePage() {
  const { can } = useSession();
  const hold = useHoldDialogs();
  useShowSite(null);
  return (
    <>
      <LiveAll
        onHold={(row) => hold.ask(holdableOf(row))}
        onRelease={(row) => hold.release(holdableOf(row))}
        firstStep={
          can.createSite ? (
            <ButtonLink kind="primary" to={paths.sites.to()}>
              Set up a site
            </ButtonLink>
          ) : null
        }
      />
      {hold.dialogs}
    </>
  );
}

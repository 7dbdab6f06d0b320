import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { useHoldDialogs } from '../features/points/components/hold-dialogs.tsx';
import { holdableOf } from '../features/readings/live-row.ts';
import { LiveSite } from '../features/readings/components/live-site.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { sitesList } from '../features/sites/api.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

/** One site. */
export default function LiveSitePage() {
  const siteId = useIdParam('siteId');
  const { can } = useSession();
  const sites = useQuery(sitesList());
  const hold = useHoldDialogs();
  useShowSite(siteId);
  const unknown = <UnknownAddress home={paths.live.to()} />;
  if (siteId === null) return unknown;
  return (
    <>
      <LiveSite
        key={siteId}
        siteId={siteId}
        missing={unknown}
        name={sites.data?.items.find((site) => site.id === siteId)?.name ?? 'Live'}
        onHold={(row) => hold.ask(holdableOf(row))}
        onRelease={(row) => hold.release(holdableOf(row))}
        firstStep={
          can.createPoint ? (
            <ButtonLink kind="primary" to={paths.newPoint.to({ siteId })}>
              Add a measuring point
            </ButtonLink>
          ) : null
        }
        more={
          <p className="page-foot">
            <Link className="link" to={paths.liveWall.to({ siteId })}>
              Show this site on a wall display
            </Link>
          </p>
        }
      />
      {hold.dialogs}
    </>
  );
}

import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { LiveWall } from '../features/readings/components/live-wall.tsx';
import { RequireSession } from '../features/sessions/components/require-session.tsx';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

/** One site on a screen that is read at four metres, without rail and controls. */
export default function LiveWallPage() {
  const siteId = useIdParam('siteId');
  if (siteId === null) return <UnknownAddress home={paths.live.to()} />;
  return (
    <RequireSession>
      <LiveWall siteId={siteId} />
    </RequireSession>
  );
}

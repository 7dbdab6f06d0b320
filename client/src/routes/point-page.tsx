import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { SectionTitle } from '../components/ui/page-head.tsx';
import { pointDetail } from '../features/points/api.ts';
import { PointView } from '../features/points/components/point-view.tsx';
import { ProbeBrief } from '../features/probes/components/probe-brief.tsx';
import { sitesList } from '../features/sites/api.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

/** One measuring point with the probe that stands there. */
export default function PointPage() {
  const id = useIdParam('id');
  const query = useQuery({ ...pointDetail(id ?? 0), enabled: id !== null });
  const sites = useQuery(sitesList()).data?.items ?? [];
  const site = sites.find((one) => one.id === query.data?.siteId);
  const timeZone = site?.timeZone ?? 'UTC';
  const unknown = <UnknownAddress home={paths.points.to()} />;
  useShowSite(query.data?.siteId);
  if (id === null) return unknown;
  return (
    <Answer
      query={query}
      what="the point"
      loading={<LoadingFace label="Fetching the point" rows={10} rowHeight={40} />}
      missing={unknown}
    >
      {(point) => (
        <PointView
          key={point.id}
          point={point}
          areas={site?.areas ?? [{ id: point.areaId, name: point.areaName }]}
          timeZone={timeZone}
          probe={
            <section>
              <SectionTitle>Probe here now</SectionTitle>
              {point.probe ? (
                <ProbeBrief id={point.probe.id} since={point.probe.since} timeZone={timeZone} />
              ) : (
                <>
                  <p className="text-ink-2">None. A probe is installed here from its own page.</p>
                  {point.can.install ? (
                    <ButtonLink
                      className="mt-3"
                      to={paths.probes.to({ status: 'spare', siteId: point.siteId })}
                    >
                      Choose a spare
                    </ButtonLink>
                  ) : null}
                </>
              )}
            </section>
          }
        />
      )}
    </Answer>
  );
}

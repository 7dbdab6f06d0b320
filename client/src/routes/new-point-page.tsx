import { useQuery } from '@tanstack/react-query';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace, LoadingFace } from '../components/ui/faces.tsx';
import { Crumbs } from '../components/ui/page-head.tsx';
import { NewPointForm } from '../features/points/components/new-point-form.tsx';
import { sitesList } from '../features/sites/api.ts';
import { idOf, useAddressFilters } from '../lib/use-address-filters.ts';
import { paths } from '../paths.ts';

/** Add a measuring point; it leads to the new point's page. */
export default function NewPointPage() {
  const { read } = useAddressFilters();
  const siteId = idOf(read('siteId'));
  const areaId = idOf(read('areaId'));
  const query = useQuery(sitesList());
  return (
    <>
      <Crumbs items={[{ label: 'Measuring points', to: paths.points.to() }]} />
      <Answer
        query={query}
        what="the sites"
        loading={<LoadingFace label="Fetching the sites" rows={8} rowHeight={84} />}
      >
        {({ items }) => {
          const sites = items.filter((site) => site.can.addPoint);
          // The site in view first: most people add points where they are.
          const inOrder = [...sites].sort((a, b) => Number(b.id === siteId) - Number(a.id === siteId));
          const areas = inOrder.flatMap((site) =>
            site.areas.map((area) => ({ ...area, siteName: site.name })),
          );
          if (areas.length > 0) {
            return (
              <NewPointForm areas={areas} areaId={areas.find((area) => area.id === areaId)?.id ?? null} />
            );
          }
          return (
            <EmptyFace
              title={sites.length > 0 ? 'A site needs an area first.' : 'You may not add points at any site.'}
              actions={<ButtonLink to={paths.sites.to()}>To the sites</ButtonLink>}
            >
              {sites.length > 0
                ? 'Open the site and add the part of the plant where the point is.'
                : 'A manager or an administrator of the site does this.'}
            </EmptyFace>
          );
        }}
      </Answer>
    </>
  );
}

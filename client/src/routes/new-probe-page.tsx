import { useQuery } from '@tanstack/react-query';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace, LoadingFace } from '../components/ui/faces.tsx';
import { Crumbs } from '../components/ui/page-head.tsx';
import { RegisterProbeForm } from '../features/probes/components/register-probe-form.tsx';
import { sitesList } from '../features/sites/api.ts';
import { idOf, useAddressFilters } from '../lib/use-address-filters.ts';
import { paths } from '../paths.ts';

/** Register a probe; it leads to the new probe's page, where it is installed and connected. */
export default function NewProbePage() {
  const asked = idOf(useAddressFilters().read('siteId'));
  const query = useQuery(sitesList());
  return (
    <>
      <Crumbs items={[{ label: 'Probes', to: paths.probes.to() }]} />
      <Answer
        query={query}
        what="the sites"
        loading={<LoadingFace label="Fetching the sites" rows={8} rowHeight={84} />}
      >
        {({ items }) => {
          const sites = items.filter((site) => site.can.registerProbe);
          if (sites.length > 0) {
            const siteId = sites.find((site) => site.id === asked)?.id ?? null;
            return <RegisterProbeForm sites={sites} siteId={siteId} />;
          }
          return (
            <EmptyFace
              title="You may not register probes at any site."
              actions={<ButtonLink to={paths.probes.to()}>To the probes</ButtonLink>}
            >
              A manager or an administrator of the site does this.
            </EmptyFace>
          );
        }}
      </Answer>
    </>
  );
}

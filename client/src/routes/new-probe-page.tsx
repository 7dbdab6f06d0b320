import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace } from '../components/ui/faces.tsx';
import { RegisterProbeForm } from '../features/probes/components/register-probe-form.tsx';
import { sitesList } from '../features/sites/api.ts';
import { paths } from '../paths.ts';

export default function NewProbePage() {
  const [params] = useSearchParams();
  const query = useQuery(sitesList());
  return (
    <Answer query={query} what="the sites">
      {({ items }) => {
        const sites = items.filter((site) => site.can.registerProbe);
        if (sites.length > 0) {
          return <RegisterProbeForm sites={sites} siteId={Number(params.get('siteId')) || null} />;
        }
        return (
          <EmptyFace
            title="You register no probes at any site."
            actions={<ButtonLink to={paths.probes.to()}>To the probes</ButtonLink>}
          >
            An instrument manager of the site does that.
          </EmptyFace>
        );
      }}
    </Answer>
  );
}

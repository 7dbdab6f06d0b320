import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { probeDetail } from '../features/probes/api.ts';
import { ProbeLoading } from '../features/probes/components/probe-loading.tsx';
import { paths } from '../paths.ts';
import { ProbePageContent } from './probe-page-content.tsx';
import { useIdParam } from './use-id-param.ts';

/** Everything about one probe. */
export default function ProbePage() {
  const id = useIdParam('id');
  const query = useQuery({ ...probeDetail(id ?? 0), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.probes.to()} />;
  if (id === null) return unknown;
  return (
    <Answer query={query} what="the probe" loading={<ProbeLoading />} missing={unknown}>
      {(probe) => <ProbePageContent key={probe.id} probe={probe} />}
    </Answer>
  );
}

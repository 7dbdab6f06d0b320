import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { LotChecks } from '../features/checks/components/lot-checks.tsx';
import { standardDetail } from '../features/standards/api.ts';
import { LotView } from '../features/standards/components/lot-view.tsx';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

export default function StandardPage() {
  const id = useIdParam('id');
  const query = useQuery({ ...standardDetail(id ?? 0), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.standards.to()} />;
  if (id === null) return unknown;
  return (
    <Answer
      query={query}
      what="the lot"
      loading={<LoadingFace label="Fetching the lot" rows={10} rowHeight={40} />}
      missing={unknown}
    >
      {(lot) => <LotView key={lot.id} lot={lot} checks={<LotChecks standardId={lot.id} />} />}
    </Answer>
  );
}

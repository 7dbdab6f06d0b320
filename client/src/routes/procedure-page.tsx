import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { procedureDetail } from '../features/procedures/api.ts';
import { ProcedureView } from '../features/procedures/components/procedure-view.tsx';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

export default function ProcedurePage() {
  const id = useIdParam('id');
  const query = useQuery({ ...procedureDetail(id ?? 0), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.procedures.to()} />;
  if (id === null) return unknown;
  return (
    <Answer
      query={query}
      what="the procedure"
      loading={<LoadingFace label="Fetching the procedure" rows={10} rowHeight={40} />}
      missing={unknown}
    >
      {(procedure) => <ProcedureView key={procedure.id} procedure={procedure} />}
    </Answer>
  );
}

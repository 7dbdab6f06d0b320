import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace, LoadingFace } from '../components/ui/faces.tsx';
import { procedureDetail } from '../features/procedures/api.ts';
import { IssueForm } from '../features/procedures/components/issue-form.tsx';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

export default function IssueProcedurePage() {
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
      {(procedure) =>
        procedure.can.change ? (
          <IssueForm key={procedure.id} procedure={procedure} />
        ) : (
          <EmptyFace
            title="No version follows this one by you."
            actions={<ButtonLink to={paths.procedure.to({ id: procedure.id })}>To the procedure</ButtonLink>}
          >
            Only a manager or an administrator of all sites issues one, and only on the version in force.
          </EmptyFace>
        )
      }
    </Answer>
  );
}

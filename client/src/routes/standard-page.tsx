import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { BottleSection } from '../features/bottles/components/bottle-section.tsx';
import { CertificateSection } from '../features/certificates/components/certificate-section.tsx';
import { LotChecks } from '../features/checks/components/lot-checks.tsx';
import { sitesList } from '../features/sites/api.ts';
import { standardDetail } from '../features/standards/api.ts';
import { LotView } from '../features/standards/components/lot-view.tsx';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

export default function StandardPage() {
  const id = useIdParam('id');
  const query = useQuery({ ...standardDetail(id ?? 0), enabled: id !== null });
  const sites = useQuery(sitesList()).data?.items ?? [];
  const unknown = <UnknownAddress home={paths.standards.to()} />;
  if (id === null) return unknown;
  return (
    <Answer
      query={query}
      what="the lot"
      loading={<LoadingFace label="Fetching the lot" rows={10} rowHeight={40} />}
      missing={unknown}
    >
      {(lot) => (
        <LotView
          key={lot.id}
          lot={lot}
          certificate={
            <CertificateSection
              certificate={lot.certificate}
              holder="standards"
              id={lot.id}
              code={lot.code}
              canAttach={lot.can.attachCertificate}
            />
          }
          bottles={<BottleSection lot={lot} sites={sites} canReceive={lot.can.receiveBottles} />}
          checks={<LotChecks standardId={lot.id} />}
        />
      )}
    </Answer>
  );
}

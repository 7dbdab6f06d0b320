import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { CertificateSection } from '../features/certificates/components/certificate-section.tsx';
import { instrumentDetail } from '../features/instruments/api.ts';
import { InstrumentView } from '../features/instruments/components/instrument-view.tsx';
import { paths } from '../paths.ts';
import { useIdParam } from './use-id-param.ts';

export default function InstrumentPage() {
  const id = useIdParam('id');
  const query = useQuery({ ...instrumentDetail(id ?? 0), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.instruments.to()} />;
  if (id === null) return unknown;
  return (
    <Answer
      query={query}
      what="the instrument"
      loading={<LoadingFace label="Fetching the instrument" rows={8} rowHeight={40} />}
      missing={unknown}
    >
      {(instrument) => (
        <InstrumentView
          key={instrument.id}
          instrument={instrument}
          certificate={
            <CertificateSection
              certificate={instrument.certificate}
              holder="instruments"
              id={instrument.id}
              code={instrument.code}
              canAttach={instrument.can.uploadCertificate}
            />
          }
        />
      )}
    </Answer>
  );
}

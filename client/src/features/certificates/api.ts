import { useMutation, useQueryClient } from '@tanstack/react-query';
import {
  certificateMediaTypes,
  type AttachCertificate,
  type Certificate,
  type CertificateMediaType,
} from '../../../../shared/contracts/certificates.ts';
import { http, withQuery } from '../../lib/http.ts';

export const certificateFile = (id: number): string => `/api/certificates/${id}`;

/** Lots and instruments take a certificate the same way. */
export type CertificateHolder = 'standards' | 'instruments';

/** The server looks at the content; the type only has to be one it takes. */
function typed(file: File): Blob {
  const isKnown = certificateMediaTypes.includes(file.type as CertificateMediaType);
  return isKnown ? file : file.slice(0, file.size, 'application/pdf');
}

/** Keeps the file, then names it at its lot or instrument. */
export function useAttachCertificate(holder: CertificateHolder, id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async ({ file, reason }: { file: File; reason: string }) => {
      const address = withQuery('/api/certificates', { fileName: file.name });
      const certificate = await http.post<Certificate>(address, typed(file));
      const body: AttachCertificate = { certificateId: certificate.id, reason };
      return http.post<unknown>(`/api/${holder}/${id}/certificate`, body);
    },
    onSuccess: () =>
      Promise.all(
        [holder, 'certificates'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })),
      ),
  });
}

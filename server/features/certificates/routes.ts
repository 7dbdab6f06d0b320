import {
  certificate,
  certificateMediaTypes,
  largestCertificateBytes,
  uploadCertificate,
} from '../../../shared/contracts/certificates.ts';
import { idPath } from '../../../shared/contracts/common.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentCertificate } from './presenter.ts';
import * as certificates from './service.ts';

export const certificateRoutes: AnyRoute[] = [
  route({
    verb: 'post',
    path: '/api/certificates',
    access: 'session',
    does: 'Keeps a certificate file as received; the same file is kept once.',
    query: uploadCertificate,
    bytes: {
      mediaTypes: certificateMediaTypes,
      largestBytes: largestCertificateBytes,
      tooLarge: 'certificates.too-large',
    },
    answer: certificate,
    status: 201,
    run: async ({ parts, actor, query, request }) =>
      presentCertificate(
        await certificates.storeCertificate(parts, actor, request.body as Buffer, query.fileName),
      ),
  }),
  route({
    verb: 'get',
    path: '/api/certificates/:id',
    access: 'session',
    does: 'Gives the certificate file, byte for byte as received.',
    params: idPath,
    sends: certificateMediaTypes,
    run: async ({ actor, params }) => certificates.readCertificateFile(actor, params.id),
  }),
];

import type { CertificateMediaType } from '../../../shared/contracts/certificates.ts';

/** First bytes of each kind of file [ISO 32000-1, 7.5.2; PNG 5.2; ISO/IEC 10918-1, B.1.1.3]. */
const beginnings: readonly [CertificateMediaType, Buffer][] = [
  ['application/pdf', Buffer.from('%PDF-')],
  ['image/png', Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])],
  ['image/jpeg', Buffer.from([0xff, 0xd8, 0xff])],
];

/** What a file is by its content, whatever its name or sender says; null when it is none of the accepted kinds. */
export function mediaTypeOf(content: Buffer): CertificateMediaType | null {
  return beginnings.find(([, bytes]) => content.subarray(0, bytes.length).equals(bytes))?.[0] ?? null;
}

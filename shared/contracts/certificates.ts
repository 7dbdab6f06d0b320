import { z } from 'zod';
import { id, instant, line, reason } from './common.ts';

/** What a certificate may be, by its content. */
export const certificateMediaTypes = ['application/pdf', 'image/png', 'image/jpeg'] as const;
export type CertificateMediaType = (typeof certificateMediaTypes)[number];

export const largestCertificateBytes = 10 * 1024 * 1024;

/** A certificate file as it was received; its bytes are at `/api/certificates/:id`. */
export const certificate = z.object({
  id,
  sha256: z.string(),
  mediaType: z.enum(certificateMediaTypes),
  byteCount: z.number().int(),
  fileName: z.string(),
  uploadedAt: instant,
  uploadedBy: z.string(),
});
export type Certificate = z.infer<typeof certificate>;

/** The file itself is the body; its name travels in the address. */
export const uploadCertificate = z.object({ fileName: line.min(1).max(200) });
export const attachCertificate = z.object({ certificateId: id, reason });
export type AttachCertificate = z.infer<typeof attachCertificate>;

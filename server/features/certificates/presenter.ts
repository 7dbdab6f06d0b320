import type { Certificate, CertificateMediaType } from '../../../shared/contracts/certificates.ts';

export interface CertificateRow {
  id: number;
  sha256: string;
  mediaType: CertificateMediaType;
  byteCount: number;
  fileName: string;
  uploadedAt: Date | string;
  uploadedBy: string;
}

/** `uploadedAt` is text where a query carried the row as JSON. */
export const presentCertificate = (row: CertificateRow): Certificate => ({
  id: row.id,
  sha256: row.sha256,
  mediaType: row.mediaType,
  byteCount: row.byteCount,
  fileName: row.fileName,
  uploadedAt: new Date(row.uploadedAt).toISOString(),
  uploadedBy: row.uploadedBy,
});

/** Certificate files: evidence kept as received, found again by hash, stored once, never changed. */
import { createHash } from 'node:crypto';
import { Certificate, User } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { mediaTypeOf } from './content.ts';
import { certificatePolicy } from './policy.ts';
import type { CertificateRow } from './presenter.ts';

const withoutContent = { exclude: ['content'] };

async function rowOf(where: { id: number } | { sha256: string }): Promise<CertificateRow | null> {
  const found = await Certificate.findOne({
    where,
    attributes: withoutContent,
    include: [{ model: User, as: 'uploader', attributes: ['name'] }],
  });
  if (!found) return null;
  const { id, sha256, mediaType, byteCount, fileName, uploadedAt, uploader } = found;
  return {
    id,
    sha256,
    mediaType: mediaType as CertificateRow['mediaType'],
    byteCount,
    fileName,
    uploadedAt,
    uploadedBy: uploader!.name,
  };
}

/** Two people may send the same file at once: the second is given what the first stored. */
export async function storeCertificate(
  parts: Parts,
  actor: Actor,
  content: Buffer,
  fileName: string,
): Promise<CertificateRow> {
  if (!maySomewhere(certificatePolicy, 'upload', actor)) throw new AppError('certificates.forbidden');
  const mediaType = mediaTypeOf(content);
  if (mediaType === null) throw new AppError('certificates.type-unknown');
  const sha256 = createHash('sha256').update(content).digest('hex');
  const facts = { sha256, mediaType, byteCount: content.length, fileName };
  const known = await rowOf({ sha256 });
  if (known) return known;
  await refusingByConstraint({ certificates_sha256_key: 'certificates.changed-meanwhile' }, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const row = await Certificate.create(
        { ...facts, content, uploadedAt: parts.clock.now(), uploadedBy: actor.userId },
        { transaction },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: 'certificates.uploaded',
        objectKind: 'certificates',
        objectId: row.id,
        siteId: null,
        newValue: facts,
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'certificates', id: row.id, kind: 'created' }, null),
      );
    }),
  ).catch((error: unknown) => {
    if (!(error instanceof AppError) || error.code !== 'certificates.changed-meanwhile') throw error;
  });
  return (await rowOf({ sha256 }))!;
}

export interface CertificateFile {
  mediaType: string;
  fileName: string;
  bytes: Buffer;
}

export async function readCertificateFile(actor: Actor, id: number): Promise<CertificateFile> {
  if (!maySomewhere(certificatePolicy, 'read', actor)) throw new AppError('certificates.not-found');
  const found = await Certificate.findByPk(id);
  if (!found) throw new AppError('certificates.not-found');
  return { mediaType: found.mediaType, fileName: found.fileName, bytes: found.content };
}

/** The file that a lot or an instrument is about to name; for the audit trail its hash and name. */
export async function requireCertificate(
  transaction: OpenTransaction,
  id: number,
): Promise<Pick<CertificateRow, 'id' | 'sha256' | 'fileName'>> {
  const found = await Certificate.findByPk(id, { attributes: ['id', 'sha256', 'fileName'], transaction });
  if (!found) throw new AppError('certificates.not-found');
  return { id: found.id, sha256: found.sha256, fileName: found.fileName };
}

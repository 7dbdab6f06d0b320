/** The signed record as a file to take away. Every download is on the trail: an auditor's copies are evidence too. */
import { Op } from 'sequelize';
import { readRecordContent, type SignedRecord } from '../../reports/record-content.ts';
import { calibrationRecordPdf } from '../../reports/calibration-record-pdf.ts';
import { Calibration } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import type { Actor } from '../../http/actor.ts';
import type { ByteAnswer } from '../../http/route.ts';
import { sha256Hex } from '../../lib/hashing.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { presentRecord } from './presenter.ts';
import { readRecord, type Run } from './service.ts';

/** As many as the strip has room for. */
const earlierShown = 3;

export async function downloadRecordPdf(parts: Parts, actor: Actor, id: number): Promise<ByteAnswer> {
  const run = await readRecord(actor, id);
  const bytes = await calibrationRecordPdf(await signedRecordOf(run));
  const { row } = run;
  await inTransaction(parts.sequelize, (transaction) =>
    recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.record-downloaded',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: row.version,
      siteId: row.siteId,
      newValue: {
        number: row.number,
        form: 'PDF',
        recordHash: row.recordHash,
        fileSha256: sha256Hex(bytes),
      },
    }),
  );
  return { mediaType: 'application/pdf', bytes, fileName: `${row.number}.pdf` };
}

export async function signedRecordOf(run: Run): Promise<SignedRecord> {
  const { record, recordHash, status, signatures, amends, amendedBy, dueOn } = presentRecord(run);
  return {
    record: readRecordContent(record),
    recordHash,
    status,
    signatures,
    amends,
    amendedBy,
    tolerancePercent: run.row.tolerancePercent,
    earlierErrors: await earlierErrorsOf(run),
    dueOn: run.row.site.policy['intervalOnRecord'] === true ? dueOn : null,
  };
}

/** What was left at the visits before this one, newest first; later visits never change an older record. */
async function earlierErrorsOf({ row }: Run): Promise<number[]> {
  const earlier = await Calibration.findAll({
    attributes: ['judgement'],
    where: {
      probeId: row.probeId,
      startedAt: { [Op.lt]: row.startedAt },
      signedAt: { [Op.ne]: null },
      amendsId: null,
    },
    order: [['startedAt', 'DESC']],
    limit: earlierShown,
  });
  return earlier.flatMap(({ judgement }) => (judgement.asLeft ? [judgement.asLeft.errorPercent] : []));
}

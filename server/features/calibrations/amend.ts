/** A correction is a record of its own with its own number; what was signed stays as it was. */
import { randomUUID } from 'node:crypto';
import type { AmendCalibration } from '../../../shared/contracts/calibrations.ts';
import { Calibration } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise, may } from '../../http/authorise.ts';
import { canonicalJson, sha256Hex } from '../../lib/hashing.ts';
import type { Parts } from '../../parts.ts';
import { inTransaction } from '../../db/transaction.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { bringIntoEffect } from './effect.ts';
import { calibrationPolicy } from './policy.ts';
import { buildAmendment } from './record.ts';
import { announce, codes, loadRun, lockRun, readRun, type Run, type Told } from './runs.ts';
import { addSignature, confirmSigner, needsReview, recordFacts } from './sign.ts';

export const mayAmend = (run: Run, actor: Actor): boolean =>
  run.row.performerId === actor.userId || may(calibrationPolicy, 'review', actor, run.row.siteId);

function refuseAmendment(run: Run, actor: Actor): void {
  if (!mayAmend(run, actor)) throw new AppError('calibrations.forbidden');
  if (run.row.status === 'amended' || run.amendedBy) throw new AppError('calibrations.amended');
  if (run.row.signedAt === null) throw new AppError('calibrations.not-signed');
}

export async function amendCalibration(
  parts: Parts,
  actor: Actor,
  id: number,
  input: AmendCalibration,
): Promise<Run> {
  const seen = await readRun(actor, id);
  authorise(calibrationPolicy, 'amend', actor, seen.row.siteId, codes);
  refuseAmendment(seen, actor);
  await confirmSigner(parts, actor, input.password);
  const { password: _password, ...said } = input;
  const amendmentId = await inTransaction(parts.sequelize, async (transaction) => {
    const run = await lockRun(transaction, actor, 'amend', id);
    refuseAmendment(run, actor);
    const statusBefore = run.row.status;
    await run.row.update({ status: 'amended' }, { transaction });
    const amendment = await createAmendment(parts, transaction, actor, run, said);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.amended',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: run.row.version,
      siteId: run.row.siteId,
      oldValue: { status: statusBefore },
      newValue: { status: 'amended', amendment: amendment.number, aspect: input.aspect, text: input.text },
      reason: input.reason,
    });
    announce(parts, transaction, run.row, 'changed');
    return amendment.id;
  });
  return readRun(actor, amendmentId);
}

async function createAmendment(
  parts: Parts,
  transaction: OpenTransaction,
  actor: Actor,
  run: Run,
  said: { aspect: string; text: string; reason: string },
): Promise<Calibration> {
  const facts = await recordFacts(parts, transaction, run);
  const by = { id: actor.userId, name: actor.name };
  const record = buildAmendment(run, facts, { ...said, by });
  const { id: amendsId, version: _version, receivedAt: _receivedAt, ...same } = run.row.get({ plain: true });
  const created = await Calibration.create(
    {
      ...same,
      key: randomUUID(),
      number: facts.number,
      status: 'signed',
      record,
      recordHash: sha256Hex(canonicalJson(record)),
      signedAt: facts.signedAt,
      approvedAt: null,
      effectiveAt: null,
      dueOn: null,
      performerId: actor.userId,
      amendsId,
    },
    { transaction },
  );
  const amendment = (await loadRun(created.id, transaction))!;
  await addSignature(transaction, actor, amendment, {
    meaning: 'performed',
    at: facts.signedAt,
    note: said.reason,
  });
  const isOpen = !needsReview(amendment) && !amendment.amends?.isInEffect;
  const told: Told[] = isOpen ? await bringIntoEffect(parts, transaction, actor, amendment) : [];
  announce(parts, transaction, created, 'created', told);
  return created;
}

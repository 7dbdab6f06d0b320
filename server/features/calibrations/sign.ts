/** The signature: number, record, canonical form (RFC 8785), hash and manifest come about in one transaction. */
import { randomUUID } from 'node:crypto';
import { Op, type Transaction } from 'sequelize';
import type { SignatureMeaning } from '../../../shared/contracts/vocabulary.ts';
import { ROLE_LABELS } from '../../../shared/format/labels.ts';
import { toDateInput } from '../../../shared/format/dates.ts';
import { CalibrationStep, Certificate, Signature } from '../../db/models/index.ts';
import type { OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import { roleAt, type Actor } from '../../http/actor.ts';
import { canonicalJson, sha256Hex } from '../../lib/hashing.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { confirmPerson } from '../sessions/service.ts';
import { readSetting } from '../settings/service.ts';
import { bringIntoEffect } from './effect.ts';
import { countUp } from './queries.ts';
import { buildRecord, type RecordFacts } from './record.ts';
import { announce, changeRun, momentOf, readRun, requirePerforming, type Run } from './runs.ts';
import { requireCurrent } from './steps.ts';
import { contradictedCaptures } from './stream.ts';

const statements: Record<SignatureMeaning, string> = {
  performed: 'I performed this work as recorded.',
  approved: 'Reviewed and approved for use.',
  returned: 'Reviewed and returned to the performer.',
};
const method = 'signed in, password entered again at signing';

/** Sites ask for a second person unless their policy says otherwise. */
export const needsReview = (run: Run): boolean => run.row.site.policy['reviewRequired'] !== false;

export async function confirmSigner(parts: Parts, actor: Actor, password: string): Promise<void> {
  if (!(await confirmPerson(parts, actor.userId, password, actor.source)))
    throw new AppError('calibrations.password-wrong');
}

export async function signCalibration(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { password: string; capturedAt: string },
): Promise<Run> {
  await readRun(actor, id);
  await confirmSigner(parts, actor, input.password);
  return changeRun(parts, actor, 'perform', id, async (transaction, run) => {
    const { row } = run;
    // The answer to a signature was lost on its way: nothing is signed twice.
    if (row.signedAt !== null && row.performerId === actor.userId && row.amendsId === null) return;
    requirePerforming(run, actor);
    requireCurrent(run, 'sign');
    await refuseContradictions(transaction, run);
    const at = momentOf(parts, input.capturedAt, row.startedAt);
    run.steps.push(await signStep(parts, transaction, actor, run, at));
    const facts = await recordFacts(parts, transaction, run);
    const record = buildRecord(run, facts);
    const recordHash = sha256Hex(canonicalJson(record));
    await row.update(
      { status: 'signed', number: facts.number, record, recordHash, signedAt: facts.signedAt },
      { transaction },
    );
    await addSignature(transaction, actor, run, { meaning: 'performed', at: facts.signedAt, capturedAt: at });
    const told = needsReview(run) ? [] : await bringIntoEffect(parts, transaction, actor, run);
    await recordAuditEvent(parts, transaction, actor, {
      action: 'calibrations.signed',
      objectKind: 'calibrations',
      objectId: id,
      objectVersion: row.version,
      siteId: row.siteId,
      oldValue: { status: 'running' },
      newValue: { status: 'signed', number: row.number, recordHash, dueOn: row.dueOn },
      capturedAt: at,
    });
    announce(parts, transaction, row, 'changed', told);
  });
}

async function refuseContradictions(transaction: Transaction, run: Run): Promise<void> {
  const differing = await contradictedCaptures(transaction, run);
  if (differing.length === 0) return;
  throw new AppError('calibrations.step-incomplete', {
    detail:
      'The device’s own readings arrived meanwhile and differ from what was captured. Stop this run and repeat it.',
    issues: differing.map(({ step, position }) => ({
      path: 'captures',
      message: `${step}, replicate ${position}`,
    })),
  });
}

const signStep = (parts: Parts, transaction: Transaction, actor: Actor, run: Run, at: Date) =>
  CalibrationStep.create(
    {
      key: randomUUID(),
      step: 'sign',
      data: { step: 'sign' },
      capturedAt: at,
      receivedAt: parts.clock.now(),
      calibrationId: run.row.id,
      userId: actor.userId,
    },
    { transaction },
  ).then((step) => step.reload({ include: ['user'], transaction }));

/** Digits of a number within its year; a busier site gets longer ones. */
const numberDigits = 4;

/** Counts up last, so that a site's signatures wait for each other as briefly as can be. */
export async function recordFacts(parts: Parts, transaction: Transaction, run: Run): Promise<RecordFacts> {
  const { site, siteId, standard, secondStandard, thermometer } = run.row;
  const signedAt = parts.clock.now();
  const ids = [standard.certificateId, secondStandard?.certificateId, thermometer?.certificateId].filter(
    (id): id is number => typeof id === 'number',
  );
  const files = await Certificate.findAll({
    attributes: ['id', 'sha256', 'fileName'],
    where: { id: { [Op.in]: ids } },
    transaction,
  });
  const { name: organisation } = await readSetting('organisation');
  const year = toDateInput(signedAt, { timeZone: site.timeZone }).slice(0, 4);
  const count = await countUp(parts, transaction, siteId, Number(year));
  return {
    number: `${site.code}-${year}-${String(count).padStart(numberDigits, '0')}`,
    signedAt,
    organisation,
    certificates: new Map(files.map(({ id, sha256, fileName }) => [id, { sha256, fileName }])),
  };
}

export async function addSignature(
  transaction: OpenTransaction,
  actor: Actor,
  run: Pick<Run, 'row'>,
  given: { meaning: SignatureMeaning; at: Date; capturedAt?: Date; note?: string | null },
): Promise<void> {
  const role = roleAt(actor, run.row.siteId);
  await Signature.create(
    {
      name: actor.name,
      role: role ? ROLE_LABELS[role] : 'unknown',
      meaning: given.meaning,
      statement: statements[given.meaning],
      method,
      recordHash: run.row.recordHash!,
      note: given.note ?? null,
      signedAt: given.at,
      capturedAt: given.capturedAt ?? given.at,
      calibrationId: run.row.id,
      userId: actor.userId,
    },
    { transaction },
  );
}

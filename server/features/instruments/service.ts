/** Reference instruments: what a run's temperatures, masses and resistances rest on. */
import {
  createInstrument as instrumentRules,
  type ChangeInstrument,
  type CreateInstrument,
  type InstrumentsQuery,
} from '../../../shared/contracts/instruments.ts';
import type { AttachCertificate } from '../../../shared/contracts/certificates.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { Instrument } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { parsePart } from '../../http/validate.ts';
import { changesBetween } from '../../lib/changes.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { requireCertificate } from '../certificates/service.ts';
import { instrumentPolicy } from './policy.ts';
import {
  countInstruments,
  selectInstrumentUses,
  selectInstruments,
  type InstrumentRow,
  type InstrumentUseRow,
} from './queries.ts';

const codeTaken = {
  instruments_code_key: 'instruments.code-taken',
  instruments_code_lower_key: 'instruments.code-taken',
} as const;
/** Enough to follow an instrument through a due period. */
const usesShown = 100;
const todayOf = (parts: Parts): string => parts.clock.now().toISOString().slice(0, 10);

function authoriseSomewhere(actor: Actor, action: keyof typeof instrumentPolicy): void {
  if (!maySomewhere(instrumentPolicy, action, actor)) throw new AppError('instruments.forbidden');
}

export async function listInstruments(
  parts: Parts,
  actor: Actor,
  query: InstrumentsQuery,
): Promise<ListOf<InstrumentRow>> {
  authoriseSomewhere(actor, 'read');
  const after = readCursor(query.cursor, ['text', 'text']);
  const filter = {
    instrumentId: null,
    kind: query.kind ?? null,
    usableOn: query.usable === '1' ? todayOf(parts) : null,
    pattern: containsPattern(query.q),
  };
  const [found, total] = await Promise.all([
    selectInstruments(parts, filter, readableSites(actor), after, query.limit + 1),
    countInstruments(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.kind, row.code.toLowerCase()]);
  return { items: rows, total, nextCursor };
}

export async function readInstrument(parts: Parts, actor: Actor, id: number): Promise<InstrumentRow> {
  authoriseSomewhere(actor, 'read');
  const filter = { instrumentId: id, kind: null, usableOn: null, pattern: null };
  const [row] = await selectInstruments(parts, filter, readableSites(actor), null, 1);
  if (!row) throw new AppError('instruments.not-found');
  return row;
}

export async function listInstrumentUses(
  parts: Parts,
  actor: Actor,
  id: number,
): Promise<InstrumentUseRow[]> {
  await readInstrument(parts, actor, id);
  return selectInstrumentUses(parts, id, readableSites(actor), usesShown);
}

function announce(parts: Parts, transaction: OpenTransaction, id: number, kind: 'created' | 'changed'): void {
  transaction.afterCommit(() => parts.broadcast.changed({ slice: 'instruments', id, kind }, null));
}

export async function createInstrument(
  parts: Parts,
  actor: Actor,
  input: CreateInstrument,
): Promise<InstrumentRow> {
  authoriseSomewhere(actor, 'create');
  const id = await refusingByConstraint(codeTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const row = await Instrument.create({ ...input, certificateId: null }, { transaction });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'instruments.created',
        objectKind: 'instruments',
        objectId: row.id,
        objectVersion: row.version,
        siteId: null,
        newValue: input,
      });
      announce(parts, transaction, row.id, 'created');
      return row.id;
    }),
  );
  return readInstrument(parts, actor, id);
}

async function lockInstrument(transaction: OpenTransaction, id: number): Promise<Instrument> {
  const row = await Instrument.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  if (!row) throw new AppError('instruments.not-found');
  return row;
}

/** A new certificate brings new dates and a new U; the old ones stay in the audit trail, and runs keep what they used. */
export async function changeInstrument(
  parts: Parts,
  actor: Actor,
  id: number,
  { reason, version, ...patch }: ChangeInstrument,
): Promise<InstrumentRow> {
  authoriseSomewhere(actor, 'change');
  await inTransaction(parts.sequelize, async (transaction) => {
    const row = await lockInstrument(transaction, id);
    if (row.version !== version) throw new AppError('instruments.changed-meanwhile');
    const changes = changesBetween(row.get(), patch);
    if (!changes) return;
    parsePart(instrumentRules, { ...row.get(), ...changes.newValue }, 'body');
    await row.update(changes.newValue, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'instruments.changed',
      objectKind: 'instruments',
      objectId: id,
      objectVersion: row.version,
      siteId: null,
      ...changes,
      reason,
    });
    announce(parts, transaction, id, 'changed');
  });
  return readInstrument(parts, actor, id);
}

export async function attachCertificate(
  parts: Parts,
  actor: Actor,
  id: number,
  { certificateId, reason }: AttachCertificate,
): Promise<InstrumentRow> {
  authoriseSomewhere(actor, 'change');
  await inTransaction(parts.sequelize, async (transaction) => {
    const row = await lockInstrument(transaction, id);
    const file = await requireCertificate(transaction, certificateId);
    const before = row.certificateId;
    if (before === certificateId) return;
    await row.update({ certificateId }, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'instruments.certificate-attached',
      objectKind: 'instruments',
      objectId: id,
      objectVersion: row.version,
      siteId: null,
      oldValue: { certificateId: before },
      newValue: { certificateId, sha256: file.sha256, fileName: file.fileName },
      reason,
    });
    announce(parts, transaction, id, 'changed');
  });
  return readInstrument(parts, actor, id);
}

/** An instrument that somebody is about to rely on: of that kind, in use and not past its due date. */
export async function requireUsableInstrument(
  parts: Parts,
  id: number,
  kind: Instrument['kind'],
): Promise<Instrument> {
  const row = await Instrument.findByPk(id);
  if (!row || row.kind !== kind) throw new AppError('instruments.not-found');
  if (row.state !== 'in-use' || row.dueOn < todayOf(parts))
    throw new AppError('instruments.overdue', { detail: `${row.code} cannot be used now.` });
  return row;
}

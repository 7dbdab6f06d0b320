/**
 * Lots of reference solution. They travel between sites, so that rights at any one site count. What the
 * certificate says never changes; a lot's state does, with a reason.
 */
import type {
  ChangeStandardState,
  CreateStandard,
  StandardsQuery,
  StandardUses,
} from '../../../shared/contracts/standards.ts';
import type { AttachCertificate } from '../../../shared/contracts/certificates.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import type { StandardState } from '../../../shared/contracts/vocabulary.ts';
import { Standard } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { requireCertificate } from '../certificates/service.ts';
import { standardPolicy } from './policy.ts';
import {
  countBottlesOfLot,
  countStandards,
  selectDerivedLots,
  selectProbeUses,
  selectStandards,
  selectStateChanges,
  type ProbeUseRow,
  type StandardRow,
  type StateChangeRow,
} from './queries.ts';

export const lotCodeTaken = {
  standards_code_key: 'standards.code-taken',
  standards_code_lower_key: 'standards.code-taken',
} as const;

export function authoriseSomewhere(actor: Actor, action: keyof typeof standardPolicy): void {
  if (!maySomewhere(standardPolicy, action, actor)) throw new AppError('standards.forbidden');
}

export async function listStandards(
  parts: Parts,
  actor: Actor,
  query: StandardsQuery,
): Promise<ListOf<StandardRow>> {
  authoriseSomewhere(actor, 'read');
  const after = readCursor(query.cursor, ['text']);
  const filter = { standardId: null, state: query.state ?? null, pattern: containsPattern(query.q) };
  const [found, total] = await Promise.all([
    selectStandards(parts, filter, after, query.limit + 1),
    countStandards(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.code.toLowerCase()]);
  return { items: rows, total, nextCursor };
}

export async function readStandard(parts: Parts, actor: Actor, id: number): Promise<StandardRow> {
  authoriseSomewhere(actor, 'read');
  const [row] = await selectStandards(parts, { standardId: id, state: null, pattern: null }, null, 1);
  if (!row) throw new AppError('standards.not-found');
  return row;
}

/** A lot arrives quarantined: somebody reads its certificate against the bottle before it is released. */
const onArrival = { state: 'quarantined', stateReason: 'Registered, not released yet.' } as const;

export async function createStandard(
  parts: Parts,
  actor: Actor,
  input: CreateStandard,
): Promise<StandardRow> {
  authoriseSomewhere(actor, 'create');
  const id = await refusingByConstraint(lotCodeTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const lot = await Standard.create(
        { ...input, ...onArrival, stateChangedAt: parts.clock.now() },
        { transaction },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: 'standards.created',
        objectKind: 'standards',
        objectId: lot.id,
        objectVersion: lot.version,
        siteId: null,
        newValue: { ...input, state: lot.state },
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'standards', id: lot.id, kind: 'created' }, null),
      );
      return lot.id;
    }),
  );
  return readStandard(parts, actor, id);
}

const actionTowards = {
  released: 'release',
  quarantined: 'quarantine',
  recalled: 'recall',
} as const satisfies Record<StandardState, keyof typeof standardPolicy>;

export async function changeStandardState(
  parts: Parts,
  actor: Actor,
  id: number,
  input: ChangeStandardState,
): Promise<StandardRow> {
  authoriseSomewhere(actor, actionTowards[input.state]);
  await inTransaction(parts.sequelize, async (transaction) => {
    const lot = await Standard.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!lot) throw new AppError('standards.not-found');
    if (lot.version !== input.version) throw new AppError('standards.changed-meanwhile');
    const before = { state: lot.state, stateReason: lot.stateReason };
    if (before.state === input.state) return;
    if (before.state === 'recalled') throw new AppError('standards.state-impossible');
    const after = { state: input.state, stateReason: input.reason };
    await lot.update({ ...after, stateChangedAt: parts.clock.now() }, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: `standards.${input.state}`,
      objectKind: 'standards',
      objectId: id,
      objectVersion: lot.version,
      siteId: null,
      oldValue: before,
      newValue: after,
      reason: input.reason,
    });
    transaction.afterCommit(() => parts.broadcast.changed({ slice: 'standards', id, kind: 'changed' }, null));
  });
  return readStandard(parts, actor, id);
}

/** What the certificate says is fixed; the file that shows it may come later, or be replaced by a better scan. */
export async function attachCertificate(
  parts: Parts,
  actor: Actor,
  id: number,
  { certificateId, reason }: AttachCertificate,
): Promise<StandardRow> {
  authoriseSomewhere(actor, 'attachCertificate');
  await inTransaction(parts.sequelize, async (transaction) => {
    const lot = await Standard.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!lot) throw new AppError('standards.not-found');
    const file = await requireCertificate(transaction, certificateId);
    const before = lot.certificateId ?? null;
    if (before === certificateId) return;
    await lot.update({ certificateId }, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'standards.certificate-attached',
      objectKind: 'standards',
      objectId: id,
      objectVersion: lot.version,
      siteId: null,
      oldValue: { certificateId: before },
      newValue: { certificateId, sha256: file.sha256, fileName: file.fileName },
      reason,
    });
    transaction.afterCommit(() => parts.broadcast.changed({ slice: 'standards', id, kind: 'changed' }, null));
  });
  return readStandard(parts, actor, id);
}

export async function listStateChanges(parts: Parts, actor: Actor, id: number): Promise<StateChangeRow[]> {
  await readStandard(parts, actor, id);
  return selectStateChanges(parts, id);
}

export interface LotUses extends Omit<StandardUses, 'probes'> {
  probes: ProbeUseRow[];
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

/** Everything that rests on a lot, at the sites the actor may read: what a recall would touch. */
export async function readUses(parts: Parts, actor: Actor, id: number): Promise<LotUses> {
  await readStandard(parts, actor, id);
  const [probes, derivedLots, bottles] = await Promise.all([
    selectProbeUses(parts, id, readableSites(actor)),
    selectDerivedLots(parts, id),
    countBottlesOfLot(parts, id),
  ]);
  const ifRecalled = {
    checkCount: sum(probes.map((probe) => probe.checkCount)),
    calibrationCount: sum(probes.map((probe) => probe.calibrationCount)),
    probeCount: probes.length,
    probesWithoutOtherEvidence: probes.filter((probe) => probe.restsOnThisLot).length,
  };
  return { probes, derivedLots, bottles, ifRecalled };
}

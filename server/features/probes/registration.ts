/** What the nameplate says: recorded once, corrected with a reason. */
import type { ChangeProbe, RegisterProbe } from '../../../shared/contracts/probes.ts';
import { CellConstant, Probe, Site } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import { changesBetween } from '../../lib/changes.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { probePolicy } from './policy.ts';
import type { WholeProbe } from './presenter.ts';
import { addEvent, lockProbe, readProbe } from './service.ts';

const siteCodes = { notFound: 'sites.not-found', forbidden: 'probes.forbidden' } as const;
const taken = {
  probes_serial_key: 'probes.serial-taken',
  probes_serial_lower_key: 'probes.serial-taken',
  probes_tag_key: 'probes.tag-taken',
  probes_tag_lower_key: 'probes.tag-taken',
} as const;
export async function registerProbe(parts: Parts, actor: Actor, input: RegisterProbe): Promise<WholeProbe> {
  authorise(probePolicy, 'register', actor, input.siteId, siteCodes);
  if (!(await Site.findOne({ where: { id: input.siteId, retiredAt: null } })))
    throw new AppError('sites.not-found');
  const now = parts.clock.now();
  const id = await refusingByConstraint(taken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await Probe.create(
        {
          ...input,
          notes: input.notes ?? '',
          cellConstantPerCm: input.nominalCellConstantPerCm,
          status: 'spare',
          retiredAt: null,
          retiredReason: null,
        },
        { transaction },
      );
      await recordCellConstant(transaction, probe, { at: now, userId: actor.userId, reason: null });
      await addEvent(transaction, probe.id, 'registered', { at: now, userId: actor.userId });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.registered',
        objectKind: 'probes',
        objectId: probe.id,
        objectVersion: probe.version,
        siteId: probe.siteId,
        newValue: input,
      });
      transaction.afterCommit(() => {
        parts.broadcast.changed({ slice: 'probes', id: probe.id, kind: 'created' }, probe.siteId);
        parts.broadcast.changed({ slice: 'sites', id: probe.siteId, kind: 'changed' }, probe.siteId);
      });
      return probe.id;
    }),
  );
  return readProbe(parts, actor, id);
}

/** The value on the nameplate, in use until a calibration finds a better one. */
async function recordCellConstant(
  transaction: OpenTransaction,
  probe: Probe,
  { at, userId, reason }: { at: Date; userId: number; reason: string | null },
): Promise<void> {
  await CellConstant.create(
    {
      cellConstantPerCm: probe.cellConstantPerCm,
      fromAt: at,
      origin: 'registered',
      reason,
      probeId: probe.id,
      userId,
    },
    { transaction },
  );
}

/**
 * Corrects the nameplate. Until a calibration or the device has set another value, the cell constant in use is
 * the nominal one, and follows its correction.
 */
async function followNominal(transaction: OpenTransaction, probe: Probe): Promise<boolean> {
  const others = await CellConstant.count({
    where: { probeId: probe.id, origin: ['calibration', 'device-reported'] },
    transaction,
  });
  if (others > 0) return false;
  probe.cellConstantPerCm = probe.nominalCellConstantPerCm;
  return true;
}

export async function changeProbe(
  parts: Parts,
  actor: Actor,
  id: number,
  { reason, version, notes, ...rest }: ChangeProbe,
): Promise<WholeProbe> {
  const patch = notes === undefined ? rest : { ...rest, notes: notes ?? '' };
  const now = parts.clock.now();
  await refusingByConstraint(taken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await lockProbe(transaction, actor, 'change', id, version);
      const changes = changesBetween(probe.get(), patch);
      if (!changes) return;
      probe.set(changes.newValue);
      refuseEmptyRange(probe);
      const isCorrected =
        probe.changed('nominalCellConstantPerCm') && (await followNominal(transaction, probe));
      await probe.save({ transaction });
      if (isCorrected)
        await recordCellConstant(transaction, probe, { at: now, userId: actor.userId, reason });
      await addEvent(transaction, id, 'settings-changed', {
        at: now,
        userId: actor.userId,
        detail: { reason, ...changes },
      });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'probes.changed',
        objectKind: 'probes',
        objectId: id,
        objectVersion: probe.version,
        siteId: probe.siteId,
        ...changes,
        reason,
      });
      transaction.afterCommit(() => {
        parts.broadcast.changed({ slice: 'probes', id, kind: 'changed' }, probe.siteId);
        parts.broadcast.changed({ slice: 'readings', id, kind: 'changed' }, probe.siteId);
      });
    }),
  );
  return readProbe(parts, actor, id);
}

/** The contract sees only what is sent; one end of the range may be sent alone. */
function refuseEmptyRange(probe: Probe): void {
  if (probe.rangeLowUsCm < probe.rangeHighUsCm) return;
  throw new AppError('request.invalid', {
    issues: [{ path: 'rangeHighUsCm', message: 'The range must end above where it starts.' }],
  });
}

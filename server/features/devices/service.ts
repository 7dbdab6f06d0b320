/** Device credentials: issued, replaced and withdrawn by an administrator; the secret is shown once. */
import type { DevicesQuery, IssueCredentials } from '../../../shared/contracts/devices.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { Device, Probe, ProbeEvent } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { hashDeviceSecret } from '../../ingest/device-secrets.ts';
import { newSecret } from '../../lib/hashing.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { devicePolicy } from './policy.ts';
import { countDevices, selectDevices, type DeviceRow } from './queries.ts';

const codes = { notFound: 'devices.not-found', forbidden: 'devices.forbidden' } as const;
const probeCodes = { notFound: 'probes.not-found', forbidden: 'devices.forbidden' } as const;
const taken = {
  devices_name_key: 'devices.name-taken',
  devices_one_active_per_probe: 'devices.exists',
} as const;

export interface NewCredentials {
  device: DeviceRow;
  secret: string;
}

export async function listDevices(
  parts: Parts,
  actor: Actor,
  query: DevicesQuery,
): Promise<ListOf<DeviceRow>> {
  const after = readCursor(query.cursor, ['text']);
  const filter = {
    siteIds: readableSites(actor),
    deviceId: null,
    probeId: query.probeId ?? null,
    pattern: containsPattern(query.q),
  };
  const [found, total] = await Promise.all([
    selectDevices(parts, filter, after, query.limit + 1),
    countDevices(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.name]);
  return { items: rows, total, nextCursor };
}

const oneDevice = { siteIds: null, deviceId: null, probeId: null, pattern: null };

/** The device that speaks for a probe now; null when none has working credentials. */
export async function activeDeviceOf(parts: Parts, probeId: number): Promise<DeviceRow | null> {
  const rows = await selectDevices(parts, { ...oneDevice, probeId }, null, null);
  return rows.find((row) => row.revokedAt === null) ?? null;
}

async function readDevice(parts: Parts, id: number): Promise<DeviceRow> {
  const [row] = await selectDevices(parts, { ...oneDevice, deviceId: id }, null, 1);
  if (!row) throw new AppError('devices.not-found');
  return row;
}

/** The credential is part of the probe's timeline, and the connection of a withdrawn one must end. */
function announce(parts: Parts, device: Device, siteId: number, kind: 'created' | 'changed'): void {
  parts.broadcast.changed({ slice: 'devices', id: device.id, kind }, siteId);
  parts.broadcast.changed({ slice: 'probes', id: device.probeId, kind: 'changed' }, siteId);
  parts.broadcast.changed({ slice: 'readings', id: device.probeId, kind: 'changed' }, siteId);
}

const neverHeard = {
  firmware: null,
  settingsHash: null,
  reportedCellConstantPerCm: null,
  readingIntervalS: null,
  clockOffsetMs: null,
  clockSource: null,
  onlineWhy: null,
  bootText: null,
  stateAt: null,
  lastSeenAt: null,
  revokedAt: null,
};

export async function issueCredentials(
  parts: Parts,
  actor: Actor,
  { probeId, name }: IssueCredentials,
): Promise<NewCredentials> {
  const secret = newSecret();
  const now = parts.clock.now();
  const id = await refusingByConstraint(taken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const probe = await Probe.findByPk(probeId, { transaction, lock: transaction.LOCK.UPDATE });
      if (!probe) throw new AppError('probes.not-found');
      authorise(devicePolicy, 'issue', actor, probe.siteId, probeCodes);
      if (probe.status === 'retired') throw new AppError('probes.retired');
      const device = await Device.create(
        { ...neverHeard, name, probeId, secretHash: hashDeviceSecret(secret), credentialsIssuedAt: now },
        { transaction },
      );
      await ProbeEvent.create(
        {
          kind: 'credentials-issued',
          detail: { name },
          at: now,
          probeId,
          pointId: null,
          userId: actor.userId,
        },
        { transaction },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: 'devices.credentials-issued',
        objectKind: 'devices',
        objectId: device.id,
        objectVersion: device.version,
        siteId: probe.siteId,
        newValue: { name, probeId },
      });
      transaction.afterCommit(() => announce(parts, device, probe.siteId, 'created'));
      return device.id;
    }),
  );
  return { device: await readDevice(parts, id), secret };
}

/** An active device locked for change, with the site of its probe. */
async function lockDevice(
  transaction: OpenTransaction,
  actor: Actor,
  action: 'replace' | 'revoke',
  id: number,
): Promise<{ device: Device; siteId: number }> {
  const device = await Device.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  const probe = device && (await Probe.findByPk(device.probeId, { transaction }));
  if (!device || !probe) throw new AppError('devices.not-found');
  authorise(devicePolicy, action, actor, probe.siteId, codes);
  if (device.revokedAt !== null) throw new AppError('devices.revoked');
  return { device, siteId: probe.siteId };
}

/** A new secret under the same name; the old one stops working at once. */
export async function replaceCredentials(
  parts: Parts,
  actor: Actor,
  id: number,
  reason: string,
): Promise<NewCredentials> {
  const secret = newSecret();
  const now = parts.clock.now();
  await inTransaction(parts.sequelize, async (transaction) => {
    const { device, siteId } = await lockDevice(transaction, actor, 'replace', id);
    const before = device.credentialsIssuedAt;
    await device.update({ secretHash: hashDeviceSecret(secret), credentialsIssuedAt: now }, { transaction });
    await ProbeEvent.create(
      {
        kind: 'credentials-issued',
        detail: { name: device.name, reason, isReplacement: true },
        at: now,
        probeId: device.probeId,
        pointId: null,
        userId: actor.userId,
      },
      { transaction },
    );
    await recordAuditEvent(parts, transaction, actor, {
      action: 'devices.credentials-replaced',
      objectKind: 'devices',
      objectId: id,
      objectVersion: device.version,
      siteId,
      oldValue: { credentialsIssuedAt: before },
      newValue: { credentialsIssuedAt: now },
      reason,
    });
    transaction.afterCommit(() => announce(parts, device, siteId, 'changed'));
  });
  return { device: await readDevice(parts, id), secret };
}

/** Withdraws one device's credentials inside a transaction of the caller, who records why in the audit trail. */
export async function withdrawCredentials(
  parts: Parts,
  transaction: OpenTransaction,
  device: Device,
  by: { userId: number; siteId: number; reason: string; at: Date },
): Promise<void> {
  await device.update({ revokedAt: by.at, isOnline: false }, { transaction });
  await ProbeEvent.create(
    {
      kind: 'credentials-revoked',
      detail: { name: device.name, reason: by.reason },
      at: by.at,
      probeId: device.probeId,
      pointId: null,
      userId: by.userId,
    },
    { transaction },
  );
  transaction.afterCommit(() => announce(parts, device, by.siteId, 'changed'));
}

export async function revokeCredentials(
  parts: Parts,
  actor: Actor,
  id: number,
  reason: string,
): Promise<DeviceRow> {
  const now = parts.clock.now();
  await inTransaction(parts.sequelize, async (transaction) => {
    const { device, siteId } = await lockDevice(transaction, actor, 'revoke', id);
    await withdrawCredentials(parts, transaction, device, { userId: actor.userId, siteId, reason, at: now });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'devices.credentials-revoked',
      objectKind: 'devices',
      objectId: id,
      objectVersion: device.version,
      siteId,
      oldValue: { revokedAt: null },
      newValue: { revokedAt: now },
      reason,
    });
  });
  return readDevice(parts, id);
}

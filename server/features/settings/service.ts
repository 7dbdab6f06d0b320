/** Organisation-wide settings with their defaults; each change is versioned and audited. */
import {
  settingDefaults,
  settingShapes,
  type SettingKey,
  type SettingValue,
} from '../../../shared/contracts/settings.ts';
import { AppError } from '../../errors.ts';
import { Setting } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { settingPolicy } from './policy.ts';

export const settingKeys = Object.keys(settingShapes) as SettingKey[];

export interface SettingRow {
  key: SettingKey;
  value: unknown;
  version: number;
  updatedAt: Date | null;
}

/** The stored value, or the default with version 0. */
export async function readSetting<K extends SettingKey>(key: K): Promise<SettingValue<K>> {
  const row = await Setting.findByPk(key);
  return (row?.value ?? settingDefaults[key]) as SettingValue<K>;
}

export async function listSettings(): Promise<SettingRow[]> {
  const stored = await Setting.findAll({ where: { key: settingKeys } });
  return settingKeys.map((key) => {
    const row = stored.find((candidate) => candidate.key === key);
    return {
      key,
      value: row?.value ?? settingDefaults[key],
      version: row?.version ?? 0,
      updatedAt: row?.updatedAt ?? null,
    };
  });
}

export async function changeSetting(
  parts: Parts,
  actor: Actor,
  key: string,
  input: { value?: unknown; reason: string; version: number },
): Promise<SettingRow> {
  if (!may(settingPolicy, 'change', actor, null)) throw new AppError('settings.forbidden');
  if (!settingKeys.includes(key as SettingKey)) throw new AppError('settings.unknown');
  const parsed = settingShapes[key as SettingKey].safeParse(input.value);
  if (!parsed.success) {
    const issues = parsed.error.issues.map((issue) => ({
      path: ['value', ...issue.path.map(String)].join('.'),
      message: issue.message,
    }));
    throw new AppError('request.invalid', { issues });
  }
  await inTransaction(parts.sequelize, (transaction) =>
    storeSetting(parts, actor, transaction, key as SettingKey, parsed.data, input),
  );
  return (await listSettings()).find((row) => row.key === key)!;
}

async function storeSetting(
  parts: Parts,
  actor: Actor,
  transaction: Parameters<Parameters<typeof inTransaction>[1]>[0],
  key: SettingKey,
  value: unknown,
  { reason, version }: { reason: string; version: number },
): Promise<void> {
  const row = await Setting.findByPk(key, { transaction, lock: true });
  if ((row?.version ?? 0) !== version) throw new AppError('settings.changed-meanwhile');
  const fields = { value, updatedAt: parts.clock.now(), version: version + 1 };
  if (row) await Setting.update(fields, { where: { key, version }, transaction });
  else await Setting.create({ key, ...fields }, { transaction });
  await recordAuditEvent(parts, transaction, actor, {
    action: 'settings.changed',
    objectKind: 'settings',
    objectId: key,
    objectVersion: version + 1,
    siteId: null,
    oldValue: row?.value ?? settingDefaults[key],
    newValue: value,
    reason,
  });
  transaction.afterCommit(() =>
    parts.broadcast.changed({ slice: 'settings', id: key, kind: 'changed' }, null),
  );
}

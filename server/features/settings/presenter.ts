import type { Setting } from '../../../shared/contracts/settings.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { settingPolicy } from './policy.ts';

export const presentSetting = (
  row: { key: string; value: unknown; version: number; updatedAt: Date | null },
  actor: Actor,
): Setting => ({
  key: row.key,
  value: row.value,
  version: row.version,
  updatedAt: row.updatedAt?.toISOString() ?? null,
  can: { change: may(settingPolicy, 'change', actor, null) },
});

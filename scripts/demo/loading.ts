/** What the steps of the demo loader share: the scenario, who became which row, and the trail to write. */
import type { Sequelize } from 'sequelize';
import type { AuditEntry } from '../../server/features/audit-events/service.ts';
import type { ScenarioHistory } from '../../simulator/scenario/history.ts';

export interface TrailEntry extends AuditEntry {
  at: number;
  /** Key of the person of the scenario. */
  by: string;
}

export interface Loading {
  sequelize: Sequelize;
  history: ScenarioHistory;
  seed: number;
  /** Row ids by the scenario's keys. */
  users: Map<string, number>;
  sites: Map<string, number>;
  points: Map<string, { id: number; siteId: number }>;
  probes: Map<string, number>;
  devices: Map<string, { id: number; bootId: number; boot: string; secret: string }>;
  standards: Map<string, number>;
  trail: TrailEntry[];
}

export const dayMs = 86_400_000;
export const dayOf = (at: number): string => new Date(at).toISOString().slice(0, 10);

export function need<K, V>(map: Map<K, V>, key: K): V {
  const value = map.get(key);
  if (value === undefined)
    throw new Error(`The demo scenario names ${String(key)}, which it does not define.`);
  return value;
}

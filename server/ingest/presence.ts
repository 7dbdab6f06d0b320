/**
 * What devices say of themselves: birth (identity and settings), state (online or not, the will included), events.
 * The order of boots decides what counts, never arrival. The database repeats the comparison, so that two servers
 * sharing a broker cannot undo each other.
 */
import type { BirthMessage, EventMessage, StateMessage } from '../../shared/contracts/mqtt.ts';
import type { ProbeEventKind } from '../../shared/contracts/vocabulary.ts';
import { isCurrentBoot } from './boot-order.ts';
import { booleanColumn, numberColumn, textColumn } from './columns.ts';
import type { Device } from './device-directory.ts';
import type { Db } from './queries.ts';

interface Heard<T> {
  device: Device;
  receivedAtMs: number;
  said: T;
}

type SaidState = Pick<StateMessage, 'boot' | 'online' | 'why'>;

export interface PresencePlan {
  /** The newest birth of each device. */
  births: Heard<BirthMessage>[];
  /** Every settings hash a birth explained. */
  explained: Heard<BirthMessage>[];
  states: Heard<SaidState>[];
  events: (Heard<EventMessage> & { atMs: number })[];
}

export interface PresenceInput {
  births: Heard<BirthMessage>[];
  states: Heard<SaidState>[];
  events: PresencePlan['events'];
}

/** Reduces what arrived to what still counts: per device the newest birth and the newest state. */
export function planPresence({ births, states, events }: PresenceInput): PresencePlan {
  const newestBoot = new Map<number, string | null>();
  const newest = <T extends { boot: string }>(all: Heard<T>[]): Heard<T>[] => {
    const kept = new Map<number, Heard<T>>();
    for (const heard of all) {
      const { id, bootText } = heard.device;
      if (!isCurrentBoot(heard.said.boot, newestBoot.get(id) ?? bootText)) continue;
      newestBoot.set(id, heard.said.boot);
      kept.set(id, heard);
    }
    return [...kept.values()].sort((a, b) => a.device.id - b.device.id);
  };
  // A device that is born is there, whatever an earlier boot's will says; a state of its own boot may follow.
  const keptBirths = newest(births);
  const started = keptBirths
    .filter(({ device, said }) => said.boot !== device.bootText)
    .map(({ device, receivedAtMs, said }) => {
      return { device, receivedAtMs, said: { boot: said.boot, online: true, why: 'start' as const } };
    });
  return {
    births: keptBirths,
    explained: births,
    states: newest<SaidState>([...started, ...states]),
    events,
  };
}

export const isEmptyPlan = (plan: PresencePlan): boolean =>
  plan.explained.length + plan.states.length + plan.events.length === 0;

export async function writePresence(db: Db, plan: PresencePlan): Promise<void> {
  if (plan.explained.length > 0) await writeSettings(db, plan.explained);
  if (plan.births.length > 0) await writeBirths(db, plan.births);
  if (plan.states.length > 0) await writeStates(db, plan.states);
  if (plan.events.length > 0) await writeEvents(db, plan.events);
}

async function writeSettings(db: Db, births: Heard<BirthMessage>[]): Promise<void> {
  // The first explanation of a hash stays: readings already refer to it.
  await db.query(
    `insert into device_settings (device_id, settings_hash, cell_constant_per_cm, birth, first_seen_at)
     select distinct on (b.device_id, b.settings_hash)
       b.device_id, b.settings_hash, b.cell_constant_per_cm, b.birth::jsonb, to_timestamp(b.received_ms / 1000)
     from unnest($1::int[], $2::text[], $3::float8[], $4::text[], $5::float8[])
       as b (device_id, settings_hash, cell_constant_per_cm, birth, received_ms)
     order by b.device_id, b.settings_hash
     on conflict (device_id, settings_hash) do update
       set cell_constant_per_cm = excluded.cell_constant_per_cm, birth = excluded.birth
       where device_settings.birth is null`,
    [
      numberColumn(births.map(({ device }) => device.id)),
      textColumn(births.map(({ said }) => said.settings)),
      numberColumn(births.map(({ said }) => said.cell_constant_per_cm)),
      textColumn(births.map(({ said }) => JSON.stringify(said))),
      numberColumn(births.map(({ receivedAtMs }) => receivedAtMs)),
    ],
  );
}

async function writeBirths(db: Db, births: Heard<BirthMessage>[]): Promise<void> {
  await db.query(
    `update devices d set firmware = b.firmware, settings_hash = b.settings_hash, boot_text = b.boot,
       reported_cell_constant_per_cm = b.cell_constant_per_cm, reading_interval_s = b.interval_s,
       clock_source = coalesce(b.clock_source, d.clock_source)
     from unnest($1::int[], $2::text[], $3::text[], $4::text[], $5::float8[], $6::float8[], $7::text[])
       as b (device_id, boot, firmware, settings_hash, cell_constant_per_cm, interval_s, clock_source)
     where d.id = b.device_id and (d.boot_text is null or d.boot_text <= b.boot)`,
    [
      numberColumn(births.map(({ device }) => device.id)),
      textColumn(births.map(({ said }) => said.boot)),
      textColumn(births.map(({ said }) => said.firmware)),
      textColumn(births.map(({ said }) => said.settings)),
      numberColumn(births.map(({ said }) => said.cell_constant_per_cm)),
      numberColumn(births.map(({ said }) => said.interval_s)),
      textColumn(births.map(({ said }) => said.clock?.source ?? null)),
    ],
  );
}

async function writeStates(db: Db, states: PresencePlan['states']): Promise<void> {
  await db.query(
    `update devices d set is_online = s.is_online, online_why = s.why, boot_text = s.boot,
       state_at = to_timestamp(s.received_ms / 1000)
     from unnest($1::int[], $2::text[], $3::boolean[], $4::text[], $5::float8[])
       as s (device_id, boot, is_online, why, received_ms)
     where d.id = s.device_id and (d.boot_text is null or d.boot_text <= s.boot)`,
    [
      numberColumn(states.map(({ device }) => device.id)),
      textColumn(states.map(({ said }) => said.boot)),
      booleanColumn(states.map(({ said }) => said.online)),
      textColumn(states.map(({ said }) => said.why)),
      numberColumn(states.map(({ receivedAtMs }) => receivedAtMs)),
    ],
  );
}

const eventKinds: Record<EventMessage['kind'], ProbeEventKind> = {
  fault: 'fault',
  settings: 'settings-changed',
  context: 'note',
};

async function writeEvents(db: Db, events: PresencePlan['events']): Promise<void> {
  const details = events.map(({ device, said }) =>
    JSON.stringify({ device: device.name, boot: said.boot, event: said.kind, text: said.text ?? null }),
  );
  await db.query(
    `insert into probe_events (kind, detail, at, recorded_at, probe_id)
     select distinct e.kind, e.detail::jsonb, to_timestamp(e.at_ms / 1000), to_timestamp(e.received_ms / 1000), e.probe_id
     from unnest($1::text[], $2::text[], $3::float8[], $4::float8[], $5::int[])
       as e (kind, detail, at_ms, received_ms, probe_id)
     where not exists (
       select 1 from probe_events known where known.probe_id = e.probe_id and known.kind = e.kind
         and known.at = to_timestamp(e.at_ms / 1000) and known.detail = e.detail::jsonb)`,
    [
      textColumn(events.map(({ said }) => eventKinds[said.kind])),
      textColumn(details),
      numberColumn(events.map(({ atMs }) => atMs)),
      numberColumn(events.map(({ receivedAtMs }) => receivedAtMs)),
      numberColumn(events.map(({ device }) => device.probeId)),
    ],
  );
}

/** Brings what is held in memory to what was committed. Answers the devices whose online state has changed. */
export function applyPresence(plan: PresencePlan): Device[] {
  for (const { device, said } of plan.births) {
    device.bootText = said.boot;
    device.reportedCellConstantPerCm = said.cell_constant_per_cm;
  }
  const changed: Device[] = [];
  for (const { device, said } of plan.states) {
    device.bootText = said.boot;
    if (device.isOnline !== said.online) changed.push(device);
    device.isOnline = said.online;
  }
  return changed;
}

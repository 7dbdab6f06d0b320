/**
 * One grouped commit: everything its messages say becomes durable together, or none of it does. Only afterwards are
 * the devices answered, the counters moved and the open pages told.
 */
import type { Pool, PoolClient } from 'pg';
import type { LivePoint } from '../../shared/contracts/realtime.ts';
import { commitSeconds, messagesQuarantined, readingsDuplicate, readingsStored } from '../http/metrics.ts';
import type { Parts } from '../parts.ts';
import { valueAtReference } from '../features/readings/judge.ts';
import type { Announcements } from './announcements.ts';
import { assembleRows, toCandidates, type AssembledRows, type ReadingCandidate } from './assemble-rows.ts';
import type { Commands } from './commands.ts';
import type { DeviceActivity } from './device-activity.ts';
import type { DeviceDirectory } from './device-directory.ts';
import { gatherGroup, toldCellConstants, type GatheredGroup } from './gather-group.ts';
import type { LivePosition } from './live-order.ts';
import type { Arrival } from './message.ts';
import { writeNotices, type WrittenNotice } from './notices.ts';
import { applyPresence, isEmptyPlan, writePresence } from './presence.ts';
import { lockBoots, selectLivePositions } from './queries.ts';
import { createSessionBook, type SessionBook } from './session-book.ts';
import { insertChecks, type WrittenCheck } from './write-checks.ts';
import { insertQuarantined, insertReadings, markRollupsDue } from './write-group.ts';

export interface StoreOptions {
  parts: Parts;
  pool: Pool;
  directory: DeviceDirectory;
  activity: DeviceActivity;
  announcements: Announcements;
  commands: Pick<Commands, 'askForBirth' | 'hear'>;
  /** Several servers read the same broker: another one may have stored what this one has not seen. */
  isShared: boolean;
}

export interface Store {
  commit: (arrivals: readonly Arrival[]) => Promise<void>;
}

interface Written {
  stored: number;
  checks: WrittenCheck[];
  quarantined: number[];
  notices: WrittenNotice[];
}

export async function openStore(options: StoreOptions): Promise<Store> {
  const { parts, pool, directory, isShared } = options;
  const book = createSessionBook(pool);
  const shown = new Map<number, LivePosition>(
    (await selectLivePositions(pool)).map(({ probeId, ...position }) => [probeId, position]),
  );

  const commit = async (arrivals: readonly Arrival[]): Promise<void> => {
    const stop = commitSeconds.startTimer();
    const nowMs = parts.clock.now().getTime();
    await directory.ensureFresh();
    const group = await gatherGroup(arrivals, directory);
    await resolveSessions(book, group, new Date(nowMs));
    const candidates = toCandidates(group.readings, book, toldCellConstants(group.presence.explained));
    const client = await pool.connect();
    let rows: AssembledRows;
    let written: Written;
    try {
      if (isShared && candidates.length > 0) {
        await client.query('begin');
        await lockBoots(client, [...new Set(candidates.map(({ bootId }) => bootId))]);
      }
      rows = await assembleRows(candidates, group, { db: client, directory, isShared, shown, nowMs });
      written = await write(client, rows, group, isShared && candidates.length > 0);
    } catch (error) {
      await giveBack(client);
      throw error;
    }
    client.release();
    stop();
    try {
      afterCommit({ ...options, book, shown }, group, rows, written);
    } catch (error) {
      // What is durable must be acknowledged, whatever goes wrong in telling others about it.
      parts.log.error({ err: error }, 'a commit could not be announced');
    }
  };
  return { commit };
}

/** A connection that cannot even roll back is thrown away. */
async function giveBack(client: PoolClient): Promise<void> {
  try {
    await client.query('rollback');
    client.release();
  } catch (error) {
    client.release(error as Error);
  }
}

async function resolveSessions(book: SessionBook, group: GatheredGroup, at: Date): Promise<void> {
  const boots = group.readings.map(({ device, content }) => ({ deviceId: device.id, boot: content.boot }));
  const born = group.presence.explained.map(({ device, said }) => ({ deviceId: device.id, boot: said.boot }));
  const settings = group.readings.flatMap(({ device, content }) =>
    content.settingsHash === null ? [] : [{ deviceId: device.id, settingsHash: content.settingsHash }],
  );
  await book.resolve([...boots, ...born], settings, at);
}

/** Plain readings go in one statement, which commits by itself; anything beside them needs a transaction around it. */
async function write(
  client: PoolClient,
  rows: AssembledRows,
  group: GatheredGroup,
  isOpen: boolean,
): Promise<Written> {
  const { sorted, live, checks, rollupsDue, notices } = rows;
  const besides = checks.length + rollupsDue.length + notices.length + group.quarantine.length;
  const needsTransaction = isOpen || besides > 0 || !isEmptyPlan(group.presence);
  if (needsTransaction && !isOpen) await client.query('begin');
  const written: Written = { stored: 0, checks: [], quarantined: [], notices: [] };
  if (!isEmptyPlan(group.presence)) await writePresence(client, group.presence);
  if (sorted.fresh.length > 0) written.stored = await insertReadings(client, sorted.fresh, live);
  if (checks.length > 0) written.checks = await insertChecks(client, checks);
  if (rollupsDue.length > 0) await markRollupsDue(client, rollupsDue);
  if (notices.length > 0) written.notices = await writeNotices(client, notices);
  if (group.quarantine.length > 0) written.quarantined = await insertQuarantined(client, group.quarantine);
  if (needsTransaction) await client.query('commit');
  return written;
}

type After = StoreOptions & { book: SessionBook; shown: Map<number, LivePosition> };

function afterCommit(store: After, group: GatheredGroup, rows: AssembledRows, written: Written): void {
  count(store, group, rows, written);
  for (const { probeId, reading, deviceId, boot } of rows.live) {
    store.shown.set(probeId, { deviceId, boot, n: reading.n, atMs: reading.atMs });
  }
  for (const { device, said } of group.presence.explained)
    store.book.forgetSettings(device.id, said.settings);
  for (const { deviceName, reply } of group.replies) store.commands.hear(deviceName, reply);
  for (const { device, settingsHash, settingsCellConstantPerCm } of rows.sorted.fresh) {
    if (settingsHash !== null && settingsCellConstantPerCm === null) store.commands.askForBirth(device.name);
  }
  announceReadings(store, rows);
  announceRest(store, group, rows, written);
}

function count(
  { activity, parts }: After,
  group: GatheredGroup,
  rows: AssembledRows,
  written: Written,
): void {
  for (const { device, receivedAtMs, sentMs, clockSource } of group.heard) {
    activity.heard(device.id, receivedAtMs, sentMs, clockSource);
  }
  const { fresh, repeated } = rows.sorted;
  for (const { deviceId } of repeated) activity.repeated(deviceId, 1);
  readingsStored.inc(written.stored);
  readingsDuplicate.inc(repeated.length + fresh.length - written.stored);
  if (written.stored < fresh.length) {
    parts.log.warn(
      { missing: fresh.length - written.stored },
      'the primary key refused readings taken for new',
    );
  }
  for (const { code } of group.quarantine) messagesQuarantined.inc({ code });
}

const siteOf = (directory: DeviceDirectory, probeId: number, atMs: number): number | null =>
  directory.currentPoint(probeId, atMs)?.siteId ?? directory.probe(probeId)?.siteId ?? null;

function livePoint(candidate: ReadingCandidate, directory: DeviceDirectory): LivePoint {
  const { reading, probeId } = candidate;
  return {
    at: new Date(reading.atMs).toISOString(),
    conductivityUsCm: reading.conductivityUsCm,
    temperatureC: reading.temperatureC,
    valueUsCm: valueAtReference(reading, directory.currentPoint(probeId, reading.atMs)),
    context: reading.context,
    quality: reading.quality,
    flags: [...reading.flags],
    boot: candidate.boot,
    n: reading.n,
  };
}

function announceReadings({ parts, directory, announcements }: After, rows: AssembledRows): void {
  for (const candidate of rows.advancing) {
    const siteId = siteOf(directory, candidate.probeId, candidate.reading.atMs);
    parts.broadcast.readings(candidate.probeId, siteId, livePoint(candidate, directory));
  }
  for (const probeId of new Set(rows.rollupsDue.map((mark) => mark.probeId))) {
    const siteId = siteOf(directory, probeId, parts.clock.now().getTime());
    announcements.changedOften(
      `readings/${probeId}`,
      { slice: 'readings', id: probeId, kind: 'changed' },
      siteId,
    );
  }
}

function announceRest(store: After, group: GatheredGroup, rows: AssembledRows, written: Written): void {
  const { directory, announcements, parts } = store;
  const nowMs = parts.clock.now().getTime();
  for (const { id, deviceId, n } of written.checks) {
    const check = rows.checks.find(({ row }) => row.deviceId === deviceId && row.reading.n === n);
    announcements.changed({ slice: 'checks', id, kind: 'created' }, check?.siteId ?? null);
  }
  for (const { id, probeId } of written.notices) {
    const siteId = siteOf(directory, probeId, nowMs);
    announcements.changedOften(`notices/${siteId}`, { slice: 'notices', id, kind: 'created' }, siteId);
    announcements.changedOften(
      `probes/${probeId}`,
      { slice: 'probes', id: probeId, kind: 'changed' },
      siteId,
    );
  }
  const lastQuarantined = written.quarantined.at(-1);
  if (lastQuarantined !== undefined) {
    announcements.changedOften(
      'quarantine',
      { slice: 'quarantine', id: lastQuarantined, kind: 'created' },
      null,
    );
  }
  const reborn = group.presence.births.map(({ device }) => device);
  for (const device of new Set([...applyPresence(group.presence), ...reborn])) {
    const siteId = siteOf(directory, device.probeId, nowMs);
    announcements.changedOften(
      `devices/${device.id}`,
      { slice: 'devices', id: device.id, kind: 'changed' },
      siteId,
    );
  }
}

import {
  Assignment,
  CellConstant,
  Device,
  DeviceBoot,
  DeviceSettings,
  Probe,
  ProbeEvent,
} from '../../server/db/models/index.ts';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { newSecret } from '../../server/lib/hashing.ts';
import { bootIdAt } from '../../simulator/boot.ts';
import { roundCellConstant } from '../../simulator/probe.ts';
import { settingsHashOf, settingsOf } from '../../simulator/settings.ts';
import type { ProbeTimeline } from '../../simulator/scenario/timeline.ts';
import { dayMs, need, type Loading } from './loading.ts';

/** Cell constants in use, oldest first: as commissioned, then after each adjustment. */
export function cellConstantSteps(
  timeline: ProbeTimeline,
): { at: number; perCm: number; by: string | null; reason: string }[] {
  const first = timeline.turns[0]!.state.cellConstantInUsePerCm;
  const adjusted = timeline.calibrations.filter((one) => one.isAdjusted);
  return [
    {
      at: timeline.grid.from,
      perCm: adjusted[0]?.cellConstantBeforePerCm ?? first,
      by: null,
      reason: 'As commissioned',
    },
    ...adjusted.map((one) => ({
      at: one.signedAt,
      perCm: one.cellConstantAfterPerCm,
      by: one.performedBy,
      reason: `Adjusted after calibration, approved by review`,
    })),
  ];
}

export async function loadProbes(loading: Loading): Promise<void> {
  for (const timeline of loading.history.timelines) await loadProbe(loading, timeline);
}

async function loadProbe(loading: Loading, timeline: ProbeTimeline): Promise<void> {
  const { probe, stays } = timeline;
  const steps = cellConstantSteps(timeline);
  const firstAt = (stays[0]?.from ?? loading.history.endAt - 60 * dayMs) - 7 * dayMs;
  const lastPoint = stays.at(-1)?.point.code;
  const siteId = lastPoint ? need(loading.points, lastPoint).siteId : need(loading.sites, 'skerry-point');
  const isRetired = probe.status === 'retired';
  const retiredAt = isRetired ? new Date(stays.at(-1)?.until ?? loading.history.endAt) : null;
  const characteristics = {
    serial: probe.serial,
    // A retired probe gives its tag to the one that replaced it.
    tag: isRetired ? `old-${probe.serial.toLowerCase()}` : probe.tag,
    kind: probe.kind,
    nominalCellConstantPerCm: probe.nominalCellConstantPerCm,
    rangeLowUsCm: probe.rangeLowUsCm,
    rangeHighUsCm: probe.rangeHighUsCm,
    resolutionUsCm: probe.resolutionUsCm,
    temperatureSensor: probe.temperatureSensor,
    deviceCompensation: timeline.endProfile.compensation.model,
    notes: probe.model,
  };
  const row = await Probe.create({
    ...characteristics,
    cellConstantPerCm: roundCellConstant(steps.at(-1)!.perCm),
    status: probe.status,
    siteId,
    retiredAt,
    retiredReason: isRetired ? 'Body cracked: water behind the electrodes' : null,
    createdAt: new Date(firstAt),
  });
  loading.probes.set(probe.key, row.id);
  const entry = { objectKind: 'probes', objectId: row.id, siteId };
  loading.trail.push({
    ...entry,
    action: 'probes.registered',
    newValue: characteristics,
    at: firstAt,
    by: 'tomas',
  });
  await ProbeEvent.create(
    eventOf(loading, row.id, { kind: 'registered', at: firstAt, by: 'tomas', detail: {} }),
  );
  await CellConstant.bulkCreate(
    steps.map((step) => ({
      probeId: row.id,
      cellConstantPerCm: roundCellConstant(step.perCm),
      fromAt: new Date(step.at),
      origin: step.by ? ('calibration' as const) : ('registered' as const),
      reason: step.reason,
      userId: step.by ? need(loading.users, step.by) : null,
    })),
  );
  await loadStays(loading, timeline, row.id, siteId);
  if (stays.length > 0) await loadDevice(loading, timeline, row.id, isRetired);
  await loadDeeds(loading, timeline, row.id, siteId);
}

interface EventSeed {
  kind: 'registered' | 'installed' | 'moved' | 'removed' | 'cleaned' | 'adjusted' | 'retired';
  at: number;
  by: string | null;
  point?: string;
  detail: Record<string, unknown>;
}

const eventOf = (loading: Loading, probeId: number, seed: EventSeed) => ({
  probeId,
  pointId: seed.point ? need(loading.points, seed.point).id : null,
  kind: seed.kind,
  at: new Date(seed.at),
  recordedAt: new Date(seed.at),
  userId: seed.by ? need(loading.users, seed.by) : null,
  detail: seed.detail,
});

async function loadStays(
  loading: Loading,
  timeline: ProbeTimeline,
  probeId: number,
  siteId: number,
): Promise<void> {
  const { probe, stays } = timeline;
  for (const [index, stay] of stays.entries()) {
    const isLast = index === stays.length - 1;
    const isOpen = isLast && probe.status === 'in-service';
    const why = probe.assignments[index]?.why ?? '';
    const by = index === 0 ? 'pell' : 'ines';
    const point = need(loading.points, stay.point.code);
    await Assignment.create({
      probeId,
      pointId: point.id,
      fromAt: new Date(stay.from),
      toAt: isOpen ? null : new Date(stay.until),
      installedBy: need(loading.users, by),
      removedBy: isOpen ? null : need(loading.users, 'ines'),
      note: why,
    });
    const kind = index === 0 ? 'installed' : 'moved';
    const detail = { note: why };
    await ProbeEvent.create(
      eventOf(loading, probeId, { kind, at: stay.from, by, point: stay.point.code, detail }),
    );
    loading.trail.push({
      action: `probes.${kind}`,
      objectKind: 'probes',
      objectId: probeId,
      siteId: point.siteId,
      newValue: { point: stay.point.code, fromAt: new Date(stay.from) },
      reason: why || null,
      at: stay.from,
      by,
    });
  }
  if (probe.status === 'retired') {
    const at = stays.at(-1)?.until ?? loading.history.endAt;
    const reason = 'Body cracked: water behind the electrodes';
    await ProbeEvent.create(
      eventOf(loading, probeId, { kind: 'retired', at, by: 'tomas', detail: { reason } }),
    );
    loading.trail.push({
      action: 'probes.retired',
      objectKind: 'probes',
      objectId: probeId,
      siteId,
      newValue: { status: 'retired' },
      reason,
      at,
      by: 'tomas',
    });
  }
}

async function loadDevice(
  loading: Loading,
  timeline: ProbeTimeline,
  probeId: number,
  isRevoked: boolean,
): Promise<void> {
  const { probe, grid, endProfile } = timeline;
  const secret = newSecret();
  const boot = bootIdAt(grid.from);
  const constants = [...new Set(cellConstantSteps(timeline).map((step) => roundCellConstant(step.perCm)))];
  const births = constants.map((perCm) => ({
    perCm,
    settings: settingsOf(endProfile, perCm, endProfile.intervalS),
  }));
  const newest = births.at(-1)!;
  const device = await Device.create({
    name: probe.device,
    secretHash: hashDeviceSecret(secret),
    probeId,
    firmware: probe.firmware,
    settingsHash: settingsHashOf(newest.settings),
    reportedCellConstantPerCm: newest.perCm,
    readingIntervalS: endProfile.intervalS,
    clockSource: 'ntp',
    clockOffsetMs: 0,
    bootText: boot,
    isOnline: false,
    onlineWhy: null,
    stateAt: null,
    lastSeenAt: null,
    credentialsIssuedAt: new Date(grid.from),
    revokedAt: isRevoked ? new Date(timeline.stays.at(-1)?.until ?? loading.history.endAt) : null,
  });
  const bootRow = await DeviceBoot.create({ deviceId: device.id, boot, firstSeenAt: new Date(grid.from) });
  await DeviceSettings.bulkCreate(
    births.map(({ perCm, settings }) => ({
      deviceId: device.id,
      settingsHash: settingsHashOf(settings),
      cellConstantPerCm: perCm,
      birth: settings,
    })),
    { ignoreDuplicates: true },
  );
  loading.devices.set(probe.key, { id: device.id, bootId: bootRow.id, boot, secret });
}

/** Cleanings and adjustments on the timeline; the comparisons themselves are rows of `checks`. */
async function loadDeeds(
  loading: Loading,
  timeline: ProbeTimeline,
  probeId: number,
  siteId: number,
): Promise<void> {
  const cleanings = timeline.cleanings.map((one) => ({
    kind: 'cleaned' as const,
    at: one.at,
    by: one.by,
    point: one.point,
    detail: { agent: one.agent },
  }));
  const adjustments = timeline.calibrations.filter((one) => one.isAdjusted);
  const adjusted = adjustments.map((one) => ({
    kind: 'adjusted' as const,
    at: one.signedAt,
    by: one.performedBy,
    point: one.point,
    detail: { fromPerCm: one.cellConstantBeforePerCm, toPerCm: one.cellConstantAfterPerCm },
  }));
  await ProbeEvent.bulkCreate([...cleanings, ...adjusted].map((seed) => eventOf(loading, probeId, seed)));
  for (const one of adjustments) {
    loading.trail.push({
      action: 'probes.adjusted',
      objectKind: 'probes',
      objectId: probeId,
      siteId,
      oldValue: { cellConstantPerCm: one.cellConstantBeforePerCm },
      newValue: { cellConstantPerCm: one.cellConstantAfterPerCm },
      reason: 'Calibration outside two thirds of the tolerance',
      at: one.signedAt,
      by: one.performedBy,
    });
  }
}

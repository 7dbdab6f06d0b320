import { z } from 'zod';
import { id, idParam, instant, line, listQuery, longText, reason, shortText, version } from './common.ts';
import { judgedReading, strip, trust } from './readings.ts';
import {
  cellConstantOrigins,
  deviceCompensations,
  probeEventKinds,
  probeKinds,
  probeStatuses,
  temperatureSensors,
} from './vocabulary.ts';

const characteristics = z.object({
  serial: line.min(2).max(60),
  tag: z
    .string()
    .trim()
    .toLowerCase()
    .regex(/^[a-z0-9][a-z0-9-]{1,23}$/, 'Use 2 to 24 letters, digits and hyphens.'),
  kind: z.enum(probeKinds),
  nominalCellConstantPerCm: z.number().positive().max(1000),
  rangeLowUsCm: z.number().min(0),
  rangeHighUsCm: z.number().positive(),
  resolutionUsCm: z.number().positive().nullable(),
  temperatureSensor: z.enum(temperatureSensors),
  deviceCompensation: z.enum(deviceCompensations),
  notes: longText.nullable(),
});

const rangeInOrder = (probe: { rangeLowUsCm?: number; rangeHighUsCm?: number }) =>
  probe.rangeLowUsCm == null || probe.rangeHighUsCm == null || probe.rangeLowUsCm < probe.rangeHighUsCm;
const rangeSays = { path: ['rangeHighUsCm'], message: 'The range must end above where it starts.' };

export const deviceSummary = z.object({
  id,
  name: z.string(),
  isOnline: z.boolean(),
  onlineWhy: z.string().nullable(),
  lastSeenAt: instant.nullable(),
  firmware: z.string().nullable(),
  settingsHash: z.string().nullable(),
  reportedCellConstantPerCm: z.number().nullable(),
  readingIntervalS: z.number().nullable(),
  duplicateCount: z.number().int(),
  clockOffsetMs: z.number().nullable(),
  credentialsIssuedAt: instant,
  revokedAt: instant.nullable(),
});
export type DeviceSummary = z.infer<typeof deviceSummary>;

export const placement = z.object({
  id,
  pointId: id,
  pointCode: z.string(),
  pointName: z.string(),
  areaName: z.string(),
  siteId: id,
  siteName: z.string(),
  fromAt: instant,
  toAt: instant.nullable(),
});
export type Placement = z.infer<typeof placement>;

/** One row of the probe list. */
export const probeRow = characteristics.extend({
  id,
  siteId: id,
  siteName: z.string(),
  cellConstantPerCm: z.number(),
  status: z.enum(probeStatuses),
  placement: placement.nullable(),
  isOnline: z.boolean().nullable(),
  lastSeenAt: instant.nullable(),
  trust: trust,
  strip: strip.nullable(),
  version,
});
export type ProbeRow = z.infer<typeof probeRow>;

export const cellConstantEntry = z.object({
  cellConstantPerCm: z.number(),
  fromAt: instant,
  origin: z.enum(cellConstantOrigins),
  by: z.string().nullable(),
  reason: z.string().nullable(),
});

export const probe = probeRow.extend({
  device: deviceSummary.nullable(),
  reading: judgedReading.nullable(),
  placements: z.array(placement).describe('newest first'),
  cellConstants: z.array(cellConstantEntry).describe('newest first'),
  retiredAt: instant.nullable(),
  retiredReason: z.string().nullable(),
  can: z.object({
    change: z.boolean(),
    install: z.boolean(),
    move: z.boolean(),
    remove: z.boolean(),
    retire: z.boolean(),
    issueCredentials: z.boolean(),
    revokeCredentials: z.boolean(),
    addNote: z.boolean(),
  }),
});
export type Probe = z.infer<typeof probe>;

export const registerProbe = characteristics
  .extend({ siteId: id.describe('site where it is kept') })
  .refine(rangeInOrder, rangeSays);
export type RegisterProbe = z.infer<typeof registerProbe>;
export const changeProbe = characteristics
  .omit({ kind: true })
  .partial()
  .extend({ reason, version })
  .refine(rangeInOrder, rangeSays);
export type ChangeProbe = z.infer<typeof changeProbe>;
export const installProbe = z.object({
  pointId: id,
  at: instant.optional(),
  note: longText.max(1000).nullable().default(null),
  version,
});
export type InstallProbe = z.infer<typeof installProbe>;
export const moveProbe = installProbe.extend({ reason });
export type MoveProbe = z.infer<typeof moveProbe>;
export const removeProbe = z.object({ at: instant.optional(), reason, version });
export type RemoveProbe = z.infer<typeof removeProbe>;
export const retireProbe = z.object({ reason, version });
export const addProbeNote = z.object({ text: shortText });

export const probesQuery = listQuery.extend({
  siteId: idParam.optional(),
  kind: z.enum(probeKinds).optional(),
  status: z.enum(probeStatuses).optional(),
  trust: trust.shape.level.optional(),
  sort: z
    .enum(['tag', '-tag', 'serial', '-serial', 'point', '-point', 'site', '-site', 'lastSeen', '-lastSeen'])
    .default('tag'),
});
export type ProbesQuery = z.infer<typeof probesQuery>;

/** One entry of the probe’s timeline, newest first. */
export const probeEvent = z.object({
  key: z.string(),
  at: instant,
  kind: z.union([z.enum(probeEventKinds), z.literal('check')]),
  pointId: id.nullable(),
  checkId: id.nullable().describe('of a comparison'),
  title: z.string(),
  by: z.string().nullable(),
  detail: z.string().nullable(),
  strip: strip.nullable(),
});
export type ProbeEvent = z.infer<typeof probeEvent>;

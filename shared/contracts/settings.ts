import { z } from 'zod';
import { instant, reason, shortText, version } from './common.ts';

/** Values an administrator changes while the server runs; each key has its own shape and default. */
export const settingShapes = {
  organisation: z.object({ name: shortText }),
  'check-fitness': z.object({
    /** A probe without a valid comparison for longer than its interval × this is use-with-care. */
    overdueFactor: z.number().min(1).max(3),
    /** No reading for longer than this many reading intervals is no signal. */
    silentIntervals: z.number().min(2).max(100),
  }),
  'due-dates': z.object({
    /** A calibration is due soon from this many days before its day. */
    dueSoonDays: z.number().int().min(1).max(120),
  }),
  'check-uncertainty': z.object({
    temperatureStandardUncertaintyC: z.number().min(0).max(2),
    repeatabilityPercent: z.number().min(0).max(5),
  }),
} as const;
export type SettingKey = keyof typeof settingShapes;
export type SettingValue<K extends SettingKey> = z.infer<(typeof settingShapes)[K]>;

export const settingDefaults: { [K in SettingKey]: SettingValue<K> } = {
  organisation: { name: 'Saltmark' },
  'check-fitness': { overdueFactor: 1, silentIntervals: 5 },
  /** Two weeks: time to plan a visit and to have solutions at hand [common practice]. */
  'due-dates': { dueSoonDays: 14 },
  /** 0.05 K and 0.1 %: common practice for a class A sensor read in a stirred flow cell. */
  'check-uncertainty': { temperatureStandardUncertaintyC: 0.05, repeatabilityPercent: 0.1 },
};

export const setting = z.object({
  key: z.string(),
  value: z.unknown(),
  version,
  updatedAt: instant.nullable(),
  can: z.object({ change: z.boolean() }),
});
export type Setting = z.infer<typeof setting>;
export const changeSetting = z.object({ value: z.unknown(), reason, version });

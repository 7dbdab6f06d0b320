import { z } from 'zod';
import { id, reason, shortText, version } from './common.ts';

const code = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z][A-Z0-9]{1,7}$/, 'Use 2 to 8 letters and digits, starting with a letter.');
const timeZone = z.string().max(60).refine(isTimeZone, 'Use a time zone name such as Europe/London.');

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

export const area = z.object({
  id,
  siteId: id,
  name: z.string(),
  position: z.number().int(),
  pointCount: z.number().int(),
});
export type Area = z.infer<typeof area>;

export const site = z.object({
  id,
  code: z.string(),
  name: z.string(),
  timeZone: z.string(),
  areas: z.array(area),
  pointCount: z.number().int(),
  probeCount: z.number().int(),
  version,
  can: z.object({
    change: z.boolean(),
    addArea: z.boolean(),
    addPoint: z.boolean(),
    registerProbe: z.boolean(),
  }),
});
export type Site = z.infer<typeof site>;

export const createSite = z.object({ code, name: shortText, timeZone });
export type CreateSite = z.infer<typeof createSite>;
export const changeSite = z.object({
  name: shortText.optional(),
  timeZone: timeZone.optional(),
  reason,
  version,
});
export type ChangeSite = z.infer<typeof changeSite>;
export const createArea = z.object({ name: shortText });
export type CreateArea = z.infer<typeof createArea>;
export const renameArea = z.object({ name: shortText, reason });

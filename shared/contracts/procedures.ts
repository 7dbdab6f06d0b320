import { z } from 'zod';
import { id, instant, reason, shortText } from './common.ts';
import { probeKinds, runSteps } from './vocabulary.ts';

/** Numbers a run is held to; each default's origin stands in the service that offers it. */
export const criteria = z.object({
  minReplicates: z.number().int().min(3).max(20),
  stabilityWindowS: z.number().int().min(10).max(600),
  stabilityRangePercent: z.number().gt(0).max(5),
  stabilitySlopePercentPerMin: z.number().gt(0).max(5),
  temperatureRangeC: z.number().gt(0).max(2),
  stabilityTimeoutS: z.number().int().min(60).max(3600),
  repeatabilityLimitPercent: z.number().gt(0).max(5),
  adjustmentShareOfTolerance: z.number().min(0).max(1),
  /** Below this no open-beaker comparison: compare in line instead. */
  openBeakerLimitUsCm: z.number().min(0).max(1000),
});
export type Criteria = z.infer<typeof criteria>;

export const procedure = z.object({
  id,
  code: z.string(),
  name: z.string(),
  version: z.number().int().min(1),
  probeKinds: z.array(z.enum(probeKinds)).min(1),
  steps: z.array(z.enum(runSteps)),
  criteria,
  effectiveFrom: instant,
  replacedAt: instant.nullable(),
  changeReason: z.string().nullable(),
  can: z.object({ change: z.boolean() }),
});
export type Procedure = z.infer<typeof procedure>;

/** Issues the next version; versions in use by a run never change. */
export const issueProcedure = z.object({
  name: shortText,
  probeKinds: z.array(z.enum(probeKinds)).min(1),
  steps: z.array(z.enum(runSteps)).min(5),
  criteria,
  basedOnVersion: z.number().int().min(1),
  reason,
});
export type IssueProcedure = z.infer<typeof issueProcedure>;

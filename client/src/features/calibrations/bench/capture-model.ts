import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import type { Criteria } from '../../../../../shared/contracts/procedures.ts';
import type { CaptureStep } from '../../../../../shared/contracts/vocabulary.ts';
import type { SettleLimits } from './stability.ts';

/** Dry in air: ranges and slopes are taken of this much instead of a mean near zero. */
const ZERO_BASE_US_CM = 100;

/** What a window of readings is held to at a step. */
export function settleLimits(step: CaptureStep, criteria: Criteria): SettleLimits {
  if (step !== 'zero-in-air') return criteria;
  // A probe that dries in air cools and warms; its zero does not depend on it.
  return { ...criteria, leastBaseUsCm: ZERO_BASE_US_CM, temperatureRangeC: Infinity };
}

/** What the probe stands in at a step. */
export function placeWords(step: CaptureStep, run: Calibration): string {
  switch (step) {
    case 'as-found-process':
      return 'in the process';
    case 'temperature-sensor':
      return 'beside the thermometer';
    case 'zero-in-air':
      return 'dry, in air';
    case 'second-point':
      return `lot ${run.secondLot?.code ?? '–'}`;
    default:
      return run.lot.bottleCode ? `bottle ${run.lot.bottleCode}` : `lot ${run.lot.code}`;
  }
}

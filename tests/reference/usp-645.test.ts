/** USP <645> Water Conductivity, stage 1 table. Provenance: from memory, confidence high. */
import { expect, it } from 'vitest';
import { stageOneLimit } from '../../shared/science/pharmacopoeia-water.ts';

it.each([
  [0, 0.6],
  [5, 0.8],
  [10, 0.9],
  [15, 1.0],
  [20, 1.1],
  [25, 1.3],
  [30, 1.4],
  [35, 1.5],
  [40, 1.7],
  [45, 1.8],
  [50, 1.9],
  [55, 2.1],
  [60, 2.2],
  [65, 2.4],
  [70, 2.5],
  [75, 2.7],
  [80, 2.7],
  [85, 2.7],
  [90, 2.7],
  [95, 2.9],
  [100, 3.1],
])('the stage 1 limit from %d degC up is %d uS/cm', (t, limit) => {
  expect(stageOneLimit(t)).toBe(limit);
  if (t < 100) expect(stageOneLimit(t + 4.9)).toBe(limit);
});

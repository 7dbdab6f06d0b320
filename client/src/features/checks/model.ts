import type { CheckHistoryPoint } from '../../../../shared/contracts/checks.ts';
import type { CellConstantInput, CellConstantPoint } from '../../components/charts/cell-constant-geometry.ts';

interface ConstantEntry {
  cellConstantPerCm: number;
  fromAt: string;
}

/**
 * What the history of a cell constant is drawn from; null while no comparison counts or no constant is known.
 * Tolerance and guard band are those of the newest comparison: the channel says what is asked of the probe now.
 */
export function cellConstantHistory(
  points: readonly CheckHistoryPoint[],
  constants: readonly ConstantEntry[],
  now: number,
  timeZone: string,
): CellConstantInput | null {
  const newest = points.at(-1);
  if (!newest || constants.length === 0) return null;
  const tolerancePercent = newest.tolerancePercent ?? 0;
  return {
    points: points.map(pointOf),
    constants: constants
      .map((entry) => ({ from: Date.parse(entry.fromAt), cellConstantPerCm: entry.cellConstantPerCm }))
      .sort((a, b) => a.from - b.from),
    tolerancePercent,
    guardBandPercent: tolerancePercent - (newest.acceptanceLimitPercent ?? tolerancePercent),
    now,
    timeZone,
  };
}

function pointOf(point: CheckHistoryPoint): CellConstantPoint {
  const { at, stage, impliedCellConstantPerCm, expandedUncertaintyPercent: U } = point;
  return {
    at: Date.parse(at),
    stage,
    cellConstantPerCm: impliedCellConstantPerCm,
    expandedUncertaintyPerCm: U === null ? null : (impliedCellConstantPerCm * U) / 100,
  };
}

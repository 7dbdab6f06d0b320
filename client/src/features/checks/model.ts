import type { Check } from '../../../../shared/contracts/checks.ts';
import type { CellConstantInput, CellConstantPoint } from '../../components/charts/cell-constant-geometry.ts';

interface ConstantEntry {
  cellConstantPerCm: number;
  fromAt: string;
}

/** What the history of a cell constant is drawn from; null while no comparison counts and no constant is known. */
export function cellConstantHistory(
  checks: readonly Check[],
  constants: readonly ConstantEntry[],
  now: number,
  timeZone: string,
): CellConstantInput | null {
  const valid = checks.filter((check) => check.isValid && check.impliedCellConstantPerCm !== null);
  const newest = valid.reduce<Check | null>(
    (last, check) => (last && last.at > check.at ? last : check),
    null,
  );
  if (!newest || constants.length === 0) return null;
  const tolerancePercent = newest.tolerancePercent ?? 0;
  return {
    points: valid.map(pointOf).sort((a, b) => a.at - b.at),
    constants: constants
      .map((entry) => ({ from: Date.parse(entry.fromAt), cellConstantPerCm: entry.cellConstantPerCm }))
      .sort((a, b) => a.from - b.from),
    tolerancePercent,
    guardBandPercent: tolerancePercent - (newest.acceptanceLimitPercent ?? tolerancePercent),
    now,
    timeZone,
  };
}

function pointOf(check: Check): CellConstantPoint {
  const constant = check.impliedCellConstantPerCm ?? 0;
  const U = check.expandedUncertaintyPercent;
  return {
    at: Date.parse(check.at),
    cellConstantPerCm: constant,
    expandedUncertaintyPerCm: U === null ? null : (constant * U) / 100,
    stage: check.stage,
  };
}

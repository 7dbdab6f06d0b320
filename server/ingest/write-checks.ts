/** Checks into their table, one row for one reading; a reading evaluated before adds none. */
import type { CheckResult } from './evaluate.ts';
import type { LotRow, PointRow, Db } from './queries.ts';
import type { ReadingRow } from './write-group.ts';

export interface NewCheck {
  row: ReadingRow;
  lot: LotRow | undefined;
  point: PointRow | null;
  siteId: number | null;
  cellConstantPerCm: number | null;
  result: CheckResult;
}

export interface WrittenCheck {
  id: number;
  deviceId: number;
  n: number;
}

export async function insertChecks(db: Db, checks: readonly NewCheck[]): Promise<WrittenCheck[]> {
  const { rows } = await db.query<WrittenCheck>(
    `insert into checks (stage, n, solution, is_valid, invalid_reason, conductivity_us_cm, temperature_c,
       cell_constant_per_cm, reference_us_cm, error_percent, implied_cell_constant_per_cm,
       expanded_uncertainty_percent, coverage_factor, tolerance_percent, decision_rule, outcome, probability_outside,
       acceptance_limit_percent, budget, reference_source, at, received_at, probe_id, point_id, device_id, boot_id,
       standard_id)
     select 'automatic', c.n, c.solution, c.is_valid, c.invalid_reason, c.conductivity_us_cm, c.temperature_c,
       c.cell_constant_per_cm, c.reference_us_cm, c.error_percent, c.implied_cell_constant_per_cm,
       c.expanded_uncertainty_percent, c.coverage_factor, c.tolerance_percent, c.decision_rule, c.outcome,
       c.probability_outside, c.acceptance_limit_percent, c.budget, c.reference_source,
       to_timestamp(c.at_ms / 1000), to_timestamp(c.received_ms / 1000), c.probe_id, c.point_id, c.device_id, c.boot_id,
       c.standard_id
     from jsonb_to_recordset($1::jsonb) as c (n bigint, solution text, is_valid boolean, invalid_reason text,
       conductivity_us_cm float8, temperature_c float8, cell_constant_per_cm float8, reference_us_cm float8,
       error_percent float8, implied_cell_constant_per_cm float8, expanded_uncertainty_percent float8,
       coverage_factor float8, tolerance_percent float8, decision_rule text, outcome text, probability_outside float8,
       acceptance_limit_percent float8, budget jsonb, reference_source text, at_ms float8, received_ms float8,
       probe_id int, point_id int, device_id int, boot_id int, standard_id int)
     on conflict do nothing
     returning id, device_id as "deviceId", n::float8 as n`,
    [JSON.stringify(checks.map(asRecord))],
  );
  return rows;
}

function asRecord({ row, lot, point, cellConstantPerCm, result }: NewCheck): Record<string, unknown> {
  const { reading } = row;
  const known = {
    n: reading.n,
    solution: reading.solution,
    conductivity_us_cm: reading.conductivityUsCm,
    temperature_c: reading.temperatureC,
    cell_constant_per_cm: cellConstantPerCm,
    at_ms: reading.atMs,
    received_ms: row.receivedAtMs,
    probe_id: row.probeId,
    point_id: point?.pointId ?? null,
    device_id: row.deviceId,
    boot_id: row.bootId,
    standard_id: lot?.id ?? null,
    is_valid: result.isValid,
  };
  if (!result.isValid) return { ...known, invalid_reason: result.reason };
  const { evaluation } = result;
  return {
    ...known,
    reference_us_cm: evaluation.referenceUsCm,
    error_percent: evaluation.errorPercent,
    implied_cell_constant_per_cm: result.impliedCellConstantPerCm,
    expanded_uncertainty_percent: evaluation.expandedUncertaintyPercent,
    coverage_factor: evaluation.coverageFactor,
    tolerance_percent: point?.tolerancePercent ?? null,
    decision_rule: point?.decisionRule ?? null,
    outcome: evaluation.outcome,
    probability_outside: evaluation.probabilityOutside,
    acceptance_limit_percent: evaluation.acceptanceLimitPercent,
    budget: result.budget,
    reference_source: evaluation.referenceSource,
  };
}

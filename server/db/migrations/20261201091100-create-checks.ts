import type { Migration } from './migration.ts';

// A comparison against a known solution. One that counts carries its whole result; one that does not
// carries the reason instead, and is kept and shown, never used.
export const createChecks: Migration = {
  name: '20261201091100-create-checks',
  up: `
    create table checks (
      id integer generated always as identity primary key,
      stage text not null check (stage in ('automatic', 'as-found', 'as-found-cleaned', 'as-left')),
      n bigint check (n >= 0),
      solution text check (length(solution) <= 80),
      is_valid boolean not null,
      invalid_reason text check (invalid_reason in ('solution-missing', 'solution-unknown', 'solution-expired',
        'solution-quarantined', 'solution-recalled', 'not-installed', 'no-cell-constant', 'no-temperature',
        'no-conductivity', 'quality-not-good', 'outside-solution-range')),
      conductivity_us_cm double precision check (conductivity_us_cm >= 0 and conductivity_us_cm < 'Infinity'),
      temperature_c double precision check (temperature_c between -273.15 and 1000),
      cell_constant_per_cm double precision
        check (cell_constant_per_cm > 0 and cell_constant_per_cm <= 1000),
      reference_us_cm double precision check (reference_us_cm > 0 and reference_us_cm < 'Infinity'),
      error_percent double precision check (error_percent >= -100 and error_percent < 'Infinity'),
      implied_cell_constant_per_cm double precision
        check (implied_cell_constant_per_cm > 0 and implied_cell_constant_per_cm < 'Infinity'),
      expanded_uncertainty_percent double precision
        check (expanded_uncertainty_percent > 0 and expanded_uncertainty_percent < 'Infinity'),
      coverage_factor double precision check (coverage_factor >= 1 and coverage_factor <= 20),
      tolerance_percent double precision check (tolerance_percent > 0 and tolerance_percent <= 100),
      decision_rule text check (decision_rule in ('simple', 'guarded-u', 'guarded-0.83u')),
      outcome text check (outcome in ('within-clear', 'within-unsure', 'outside-unsure', 'outside-clear')),
      probability_outside double precision check (probability_outside between 0 and 1),
      acceptance_limit_percent double precision
        check (acceptance_limit_percent > '-Infinity' and acceptance_limit_percent <= 100),
      budget jsonb,
      reference_source text check (length(btrim(reference_source)) between 1 and 1000),
      at timestamptz not null,
      received_at timestamptz not null default now(),
      probe_id integer not null references probes,
      point_id integer references points,
      device_id integer references devices,
      boot_id integer references device_boots,
      standard_id integer references standards,
      performed_by_user_id integer references users,
      constraint checks_invalid_has_reason check (is_valid = (invalid_reason is null)),
      constraint checks_valid_has_result check (not is_valid or num_nulls(
        standard_id, conductivity_us_cm, temperature_c, cell_constant_per_cm, reference_us_cm, error_percent,
        implied_cell_constant_per_cm, expanded_uncertainty_percent, coverage_factor, tolerance_percent,
        decision_rule, outcome, probability_outside, acceptance_limit_percent, reference_source) = 0),
      constraint checks_reading_is_whole check (num_nulls(device_id, boot_id, n) in (0, 3))
    );
    create unique index checks_one_per_reading on checks (device_id, boot_id, n) where device_id is not null;
    create index checks_probe_id on checks (probe_id, at desc);
    create index checks_point_id on checks (point_id, at desc);
    create index checks_standard_id on checks (standard_id, at desc);
  `,
  down: `
    drop table checks;
  `,
};

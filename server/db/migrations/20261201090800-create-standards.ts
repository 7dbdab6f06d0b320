import type { Migration } from './migration.ts';

// Lots of reference solution. Each must say where its value comes from: a certified value, its own
// temperature table, or (aqueous KCl only) a primary basis with a nominal concentration.
export const createStandards: Migration = {
  name: '20261201090800-create-standards',
  up: `
    create table standards (
      id integer generated always as identity primary key,
      code text not null unique check (length(code) between 1 and 80 and code = btrim(code)),
      producer text not null check (length(btrim(producer)) between 1 and 200),
      product text not null check (length(btrim(product)) between 1 and 200),
      medium text not null check (medium in ('kcl-aqueous', 'other')),
      basis text not null check (basis in ('molal', 'demal', 'molar', 'other')),
      nominal double precision check (nominal > 0 and nominal < 'Infinity'),
      certified_conductivity_us_cm double precision
        check (certified_conductivity_us_cm > 0 and certified_conductivity_us_cm < 'Infinity'),
      reference_temperature_c double precision not null default 25 check (reference_temperature_c between 0 and 100),
      expanded_uncertainty_us_cm double precision
        check (expanded_uncertainty_us_cm > 0 and expanded_uncertainty_us_cm < 'Infinity'),
      coverage_factor double precision check (coverage_factor >= 1 and coverage_factor <= 20),
      temperature_table jsonb check (jsonb_typeof(temperature_table) in ('array', 'object')),
      traceability text not null default '' check (length(traceability) <= 4000),
      is_in_house boolean not null default false,
      issued_on date not null,
      expires_on date not null,
      state text not null check (state in ('released', 'quarantined', 'recalled')),
      state_reason text check (length(btrim(state_reason)) between 3 and 1000),
      state_changed_at timestamptz,
      created_at timestamptz not null default now(),
      version integer not null default 0,
      constraint standards_issued_before_expiry check (issued_on <= expires_on),
      constraint standards_uncertainty_has_factor
        check ((expanded_uncertainty_us_cm is null) = (coverage_factor is null)),
      constraint standards_value_has_source check (
        certified_conductivity_us_cm is not null
        or temperature_table is not null
        or (medium = 'kcl-aqueous' and basis <> 'other' and nominal is not null))
    );
    create unique index standards_code_lower_key on standards (lower(code));
  `,
  down: `
    drop table standards;
  `,
};

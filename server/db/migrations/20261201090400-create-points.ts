import type { Migration } from './migration.ts';

export const createPoints: Migration = {
  name: '20261201090400-create-points',
  up: `
    create table points (
      id integer generated always as identity primary key,
      code text not null unique check (length(code) between 1 and 40 and code = btrim(code)),
      name text not null check (length(btrim(name)) between 1 and 120),
      duty text not null check (length(duty) <= 400),
      medium text not null check (length(medium) <= 200),
      display_unit text not null check (display_unit in ('uS/cm', 'mS/cm')),
      compensation_model text not null
        check (compensation_model in ('none', 'linear', 'natural-water', 'ultrapure')),
      compensation_coefficient_percent_per_k double precision
        check (compensation_coefficient_percent_per_k between -5 and 20),
      reference_temperature_c double precision not null default 25 check (reference_temperature_c between 0 and 100),
      low_limit_us_cm double precision check (low_limit_us_cm >= 0 and low_limit_us_cm < 'Infinity'),
      high_limit_us_cm double precision check (high_limit_us_cm > 0 and high_limit_us_cm < 'Infinity'),
      tolerance_percent double precision not null check (tolerance_percent > 0 and tolerance_percent <= 100),
      decision_rule text not null check (decision_rule in ('simple', 'guarded-u', 'guarded-0.83u')),
      interval_days integer not null check (interval_days between 1 and 3660),
      interval_method text not null
        check (interval_method in ('fixed', 'staircase', 'control-chart', 'in-use-time', 'reliability')),
      criticality text not null check (criticality in ('low', 'medium', 'high', 'critical')),
      hazard_tags text[] not null default '{}' check (
        hazard_tags <@ array['chemicals', 'hypochlorite', 'hot-process', 'pressurised', 'electrical',
          'confined-space', 'control-loop', 'hygiene', 'biosecurity']
        and array_position(hazard_tags, null) is null),
      control_note text check (length(control_note) <= 1000),
      created_at timestamptz not null default now(),
      retired_at timestamptz,
      version integer not null default 0,
      area_id integer not null references areas,
      constraint points_low_below_high check (low_limit_us_cm < high_limit_us_cm),
      constraint points_linear_has_coefficient
        check (compensation_model <> 'linear' or compensation_coefficient_percent_per_k is not null)
    );
    create unique index points_code_lower_key on points (lower(code));
    create index points_area_id on points (area_id);

    create table holds (
      id integer generated always as identity primary key,
      reason text not null check (length(btrim(reason)) between 3 and 1000),
      from_at timestamptz not null,
      until_at timestamptz not null,
      ended_at timestamptz,
      point_id integer not null references points,
      user_id integer not null references users,
      constraint holds_from_before_until check (from_at < until_at),
      constraint holds_from_before_ended check (from_at <= ended_at)
    );
    create unique index holds_one_open_per_point on holds (point_id) where ended_at is null;
    create index holds_point_id on holds (point_id, from_at);
  `,
  down: `
    drop table holds;
    drop table points;
  `,
};

import type { Migration } from './migration.ts';

// A procedure is versioned: a run keeps the version it was started with, and a version never changes; a newer
// one replaces it. The two below are what an organisation starts with. Where their numbers come from:
//   minReplicates 3            three readings at least, five when the solution allows [common practice]
//   stability 0.3 % and 0.1 %/min over 60 s   tighter than "within 1 % over 30 s" of compendial texts [common practice]
//   temperatureRangeC 0.1      0.1 °C is 0.2 % of a KCl value [temperature coefficient of KCl, 1.9 %/K]
//   stabilityTimeoutS 600, inductive 1800     a large body needs 10 to 30 minutes to take the liquid's temperature
//   repeatabilityLimitPercent 0.3             standard deviation of the replicates [common practice]
//   adjustmentShareOfTolerance 2/3            adjusting below it would follow the noise [common practice]
//   openBeakerLimitUsCm 50, inductive 100     carbon dioxide of the air adds up to 1.1 µS/cm [Pratt et al. 2001], 2 % of 50;
//                                             inductive cells read poorly below about 100 [common practice]
// Zero in air stands before the first solution for an inductive probe (dry, in open space, before anything is wetted),
// and after cleaning for one with electrodes.
export const createProcedures: Migration = {
  name: '20261208090000-create-procedures',
  up: `
    create table procedures (
      id integer generated always as identity primary key,
      code text not null check (length(code) between 1 and 60 and code = btrim(code)),
      version integer not null check (version >= 1),
      name text not null check (length(btrim(name)) between 1 and 120),
      probe_kinds text[] not null check (
        probe_kinds <@ array['two-electrode', 'four-electrode', 'inductive']
        and cardinality(probe_kinds) >= 1 and array_position(probe_kinds, null) is null),
      steps text[] not null check (
        steps <@ array['identify', 'pre-checks', 'hold', 'as-found-process', 'as-found', 'clean', 'zero-in-air',
          'as-found-cleaned', 'decide', 'second-point', 'temperature-sensor', 'as-left', 'reinstall', 'review', 'sign']
        and cardinality(steps) >= 5 and array_position(steps, null) is null),
      criteria jsonb not null check (jsonb_typeof(criteria) = 'object'),
      effective_from timestamptz not null,
      replaced_at timestamptz,
      change_reason text check (length(btrim(change_reason)) between 3 and 1000),
      created_at timestamptz not null default now(),
      created_by integer references users,
      constraint procedures_code_version_key unique (code, version),
      constraint procedures_from_before_replaced check (effective_from <= replaced_at)
    );
    create unique index procedures_one_current_per_code on procedures (code) where replaced_at is null;

    insert into procedures (code, version, name, probe_kinds, steps, criteria, effective_from) values
      ('in-line-probe', 1, 'Probe with electrodes, beside its measuring point', '{two-electrode,four-electrode}',
        '{identify,pre-checks,hold,as-found-process,as-found,clean,zero-in-air,as-found-cleaned,decide,second-point,temperature-sensor,as-left,reinstall,review,sign}',
        '{"minReplicates": 3, "stabilityWindowS": 60, "stabilityRangePercent": 0.3,
          "stabilitySlopePercentPerMin": 0.1, "temperatureRangeC": 0.1, "stabilityTimeoutS": 600,
          "repeatabilityLimitPercent": 0.3, "adjustmentShareOfTolerance": 0.6667, "openBeakerLimitUsCm": 50}',
        '2026-01-01T00:00:00Z'),
      ('in-line-inductive', 1, 'Inductive probe, beside its measuring point', '{inductive}',
        '{identify,pre-checks,hold,as-found-process,zero-in-air,as-found,clean,as-found-cleaned,decide,second-point,temperature-sensor,as-left,reinstall,review,sign}',
        '{"minReplicates": 3, "stabilityWindowS": 60, "stabilityRangePercent": 0.3,
          "stabilitySlopePercentPerMin": 0.1, "temperatureRangeC": 0.1, "stabilityTimeoutS": 1800,
          "repeatabilityLimitPercent": 0.3, "adjustmentShareOfTolerance": 0.6667, "openBeakerLimitUsCm": 100}',
        '2026-01-01T00:00:00Z');
  `,
  down: `
    drop table procedures;
  `,
};

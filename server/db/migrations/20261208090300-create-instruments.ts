import type { Migration } from './migration.ts';

export const createInstruments: Migration = {
  name: '20261208090300-create-instruments',
  up: `
    create table instruments (
      id integer generated always as identity primary key,
      code text not null check (length(code) between 1 and 40 and code = btrim(code)),
      kind text not null check (kind in ('meter', 'thermometer', 'cell', 'resistor-set', 'balance')),
      name text not null check (length(btrim(name)) between 1 and 120),
      serial text not null check (length(btrim(serial)) between 1 and 120),
      certificate_number text not null check (length(btrim(certificate_number)) between 1 and 120),
      issued_on date not null,
      due_on date not null,
      expanded_uncertainty double precision not null
        check (expanded_uncertainty > 0 and expanded_uncertainty < 'Infinity'),
      uncertainty_unit text not null check (uncertainty_unit in ('C', 'percent', 'uS/cm', 'ohm', 'g')),
      coverage_factor double precision not null check (coverage_factor >= 1 and coverage_factor <= 20),
      correction double precision not null default 0 check (correction > '-Infinity' and correction < 'Infinity'),
      traceability text not null default '' check (length(traceability) <= 4000),
      state text not null default 'in-use' check (state in ('in-use', 'out-of-use')),
      created_at timestamptz not null default now(),
      version integer not null default 0,
      certificate_id integer references certificates,
      constraint instruments_code_key unique (code),
      constraint instruments_issued_before_due check (issued_on < due_on)
    );
    create unique index instruments_code_lower_key on instruments (lower(code));
    create index instruments_certificate_id on instruments (certificate_id);
  `,
  down: `
    drop table instruments;
  `,
};

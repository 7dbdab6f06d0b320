import type { Migration } from './migration.ts';

// What else a certificate says of a lot, and for a lot made in house how it was made: readings, value, budget. The
// preparation is evidence of the value and is written once, with the lot.
export const describeLots: Migration = {
  name: '20261208091000-describe-lots',
  up: `
    alter table standards
      add column storage text not null default '' check (length(storage) <= 400),
      add column coverage_probability_percent double precision
        check (coverage_probability_percent between 50 and 99.99),
      add column preparation jsonb check (jsonb_typeof(preparation) = 'object'),
      add constraint standards_preparation_is_in_house check (preparation is null or is_in_house);
    create index standards_prepared_from on standards (((preparation -> 'source' ->> 'standardId')::integer))
      where preparation is not null;
  `,
  down: `
    alter table standards
      drop column preparation, drop column coverage_probability_percent, drop column storage;
  `,
};

import { useCallback } from 'react';
import { probeKinds, probeStatuses, trustLevels } from '../../../../../shared/contracts/vocabulary.ts';
import { PROBE_KIND_LABELS, PROBE_STATUS_LABELS, TRUST_LABELS } from '../../../../../shared/format/labels.ts';
import { Field } from '../../../components/ui/field.tsx';
import { Filters, SearchField } from '../../../components/ui/filters.tsx';
import type { SelectOption } from '../../../components/ui/select.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import type { AddressFilters } from '../../../lib/use-address-filters.ts';
import type { ProbeFilters } from '../api.ts';
import { isNarrowed, PROBE_SORTS } from '../list-model.ts';

export interface ProbeListFiltersProps {
  sites: readonly { id: number; name: string }[];
  filters: ProbeFilters;
  onChange: AddressFilters['write'];
}

export function ProbeListFilters({ sites, filters, onChange }: ProbeListFiltersProps) {
  const search = useCallback((q: string) => onChange({ q }), [onChange]);
  const choice = (name: keyof ProbeFilters, label: string, placeholder: string, options: SelectOption[]) => (
    <Field label={label}>
      <Select
        placeholder={placeholder}
        options={options}
        value={String(filters[name] ?? '')}
        onChange={(event) => onChange({ [name]: event.target.value })}
      />
    </Field>
  );
  const siteOptions = sites.map((site) => ({ value: String(site.id), label: site.name }));
  return (
    <Filters label="Narrow the list of probes" isNarrowed={isNarrowed(filters)}>
      <SearchField
        label="Find a probe"
        placeholder="tag, serial number or point"
        value={filters.q ?? ''}
        onSearch={search}
      />
      {sites.length > 1 ? choice('siteId', 'Site', 'all sites', siteOptions) : null}
      {choice('kind', 'Kind', 'all kinds', optionsFrom(probeKinds, PROBE_KIND_LABELS))}
      {choice('status', 'State', 'all states', optionsFrom(probeStatuses, PROBE_STATUS_LABELS))}
      {choice('trust', 'Trust', 'all', optionsFrom(trustLevels, TRUST_LABELS))}
      <Field label="Order by">
        <Select
          options={sortOptions(filters)}
          value={filters.sort ?? 'tag'}
          onChange={(event) => onChange({ sort: event.target.value })}
        />
      </Field>
    </Filters>
  );
}

/** A descending order chosen in the head of the ledger is shown in the select as well. */
function sortOptions({ sort = 'tag' }: ProbeFilters): SelectOption[] {
  const known = PROBE_SORTS.some((option) => option.value === sort);
  if (known) return [...PROBE_SORTS];
  const plain = PROBE_SORTS.find((option) => option.value === sort.slice(1));
  return [...PROBE_SORTS, { value: sort, label: `${plain?.label ?? sort.slice(1)}, last first` }];
}

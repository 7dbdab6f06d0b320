import { useEffect, useState } from 'react';
import { probeKinds, probeStatuses, trustLevels } from '../../../../../shared/contracts/vocabulary.ts';
import { PROBE_KIND_LABELS, PROBE_STATUS_LABELS, TRUST_LABELS } from '../../../../../shared/format/labels.ts';
import { Field } from '../../../components/ui/field.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import type { ProbeFilters } from '../api.ts';

export interface ProbeFilterBarProps {
  filters: ProbeFilters;
  sites: readonly { id: number; name: string }[];
  /** An empty value takes the filter away. */
  onChange: (name: keyof ProbeFilters, value: string) => void;
}

/** A pause in typing after which the list follows, ms. */
const PAUSE_MS = 250;

export function ProbeFilterBar({ filters, sites, onChange }: ProbeFilterBarProps) {
  return (
    <div className="filter-bar" role="search" aria-label="Narrow the list">
      <Field label="Find" className="filter-find">
        <FindInput text={filters.q ?? ''} onSettled={(text) => onChange('q', text)} />
      </Field>
      <Field label="Site">
        <Select
          placeholder="all"
          options={sites.map((site) => ({ value: String(site.id), label: site.name }))}
          value={String(filters.siteId ?? '')}
          onChange={(event) => onChange('siteId', event.target.value)}
        />
      </Field>
      <Field label="Kind">
        <Select
          placeholder="all"
          options={optionsFrom(probeKinds, PROBE_KIND_LABELS)}
          value={filters.kind ?? ''}
          onChange={(event) => onChange('kind', event.target.value)}
        />
      </Field>
      <Field label="State">
        <Select
          placeholder="all"
          options={optionsFrom(probeStatuses, PROBE_STATUS_LABELS)}
          value={filters.status ?? ''}
          onChange={(event) => onChange('status', event.target.value)}
        />
      </Field>
      <Field label="Trust">
        <Select
          placeholder="all"
          options={optionsFrom(trustLevels, TRUST_LABELS)}
          value={filters.trust ?? ''}
          onChange={(event) => onChange('trust', event.target.value)}
        />
      </Field>
    </div>
  );
}

/** Follows the fingers at once and tells the list after a pause. */
function FindInput({ text, onSettled }: { text: string; onSettled: (text: string) => void }) {
  const [typed, setTyped] = useState(text);
  const [known, setKnown] = useState(text);
  if (known !== text) {
    // The address was changed from elsewhere, by Back or a link.
    setKnown(text);
    if (typed.trim() !== text) setTyped(text);
  }
  useEffect(() => {
    if (typed.trim() === text) return undefined;
    const timer = setTimeout(() => onSettled(typed.trim()), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [typed, text, onSettled]);
  return (
    <TextInput
      type="search"
      placeholder="tag, serial number or point"
      value={typed}
      onChange={(event) => setTyped(event.target.value)}
    />
  );
}

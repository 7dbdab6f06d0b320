import { useCallback } from 'react';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { Field } from '../../../components/ui/field.tsx';
import { Filters, SearchField } from '../../../components/ui/filters.tsx';
import type { SelectOption } from '../../../components/ui/select.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import type { AddressFilters } from '../../../lib/use-address-filters.ts';
import { ACTION_WORDS, OBJECT_WORDS } from '../words.ts';

export interface AuditFilterBarProps {
  people: readonly { id: number; name: string }[];
  isNarrowed: boolean;
  read: AddressFilters['read'];
  onChange: AddressFilters['write'];
}

const optionsOf = (words: Readonly<Record<string, string>>): SelectOption[] =>
  Object.entries(words).map(([value, label]) => ({ value, label: capitalise(label) }));

export function AuditFilterBar({ people, isNarrowed, read, onChange }: AuditFilterBarProps) {
  const searchObject = useCallback((objectId: string) => onChange({ objectId }), [onChange]);
  const choice = (name: string, label: string, placeholder: string, options: SelectOption[]) => (
    <Field label={label}>
      <Select
        placeholder={placeholder}
        options={options}
        value={read(name)}
        onChange={(event) => onChange({ [name]: event.target.value })}
      />
    </Field>
  );
  const day = (name: 'from' | 'to', label: string) => (
    <Field label={label}>
      <TextInput
        type="date"
        value={read(name)}
        onChange={(event) => onChange({ [name]: event.target.value })}
      />
    </Field>
  );
  const persons = people.map((person) => ({ value: String(person.id), label: person.name }));
  return (
    <Filters label="Narrow the audit trail" isNarrowed={isNarrowed}>
      {choice('objectKind', 'About', 'anything', optionsOf(OBJECT_WORDS))}
      {choice('action', 'What was done', 'anything', optionsOf(ACTION_WORDS))}
      {people.length > 0 ? choice('actorId', 'By', 'anybody', persons) : null}
      {day('from', 'From day, UTC')}
      {day('to', 'To day, UTC')}
      <SearchField label="Number of the thing" value={read('objectId')} onSearch={searchObject} />
    </Filters>
  );
}

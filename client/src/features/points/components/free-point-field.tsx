import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useState } from 'react';
import { Field } from '../../../components/ui/field.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { pointsList } from '../api.ts';

export interface FreePointFieldProps {
  value: number | null;
  onChange: (pointId: number | null) => void;
  error?: string | undefined;
}

/** Choices a select can hold without becoming a search of its own. */
const MOST_CHOICES = 200;
const SEARCH_FROM = 25;

/** Choose a measuring point that has no probe. */
export function FreePointField({ value, onChange, error }: FreePointFieldProps) {
  const [text, setText] = useState('');
  const query = useQuery(pointsList({ free: true, q: useDeferredValue(text.trim()), limit: MOST_CHOICES }));
  const points = query.data?.items ?? [];
  const hasSearch = text !== '' || (query.data?.total ?? 0) > SEARCH_FROM;
  return (
    <>
      {hasSearch ? (
        <Field label="Find a point" hint="A part of its name or code narrows the choice below.">
          <TextInput type="search" value={text} onChange={(event) => setText(event.target.value)} />
        </Field>
      ) : null}
      <Field label="Measuring point" hint={hintFor(query.isPending, points.length)} error={error}>
        <Select
          placeholder="choose a point without a probe"
          value={value === null ? '' : String(value)}
          onChange={(event) => onChange(event.target.value === '' ? null : Number(event.target.value))}
          options={points.map((point) => ({
            value: String(point.id),
            label: `${point.siteName} · ${point.areaName} · ${point.name} (${point.code})`,
          }))}
        />
      </Field>
    </>
  );
}

function hintFor(isPending: boolean, count: number): string | undefined {
  if (isPending) return 'Fetching the free points.';
  return count === 0 ? 'No point is free. Take a probe out of one, or add a point first.' : undefined;
}

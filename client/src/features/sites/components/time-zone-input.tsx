import { useId } from 'react';
import { TextInput } from '../../../components/ui/text-input.tsx';

const ZONES = Intl.supportedValuesOf('timeZone');

export interface TimeZoneInputProps {
  value: string;
  onChange: (timeZone: string) => void;
}

/** A time zone by its name; a few letters narrow the list. Put it inside a <Field>. */
export function TimeZoneInput({ value, onChange }: TimeZoneInputProps) {
  const id = useId();
  return (
    <>
      <TextInput
        list={`${id}-zones`}
        value={value}
        autoComplete="off"
        maxLength={60}
        placeholder="Europe/London"
        onChange={(event) => onChange(event.target.value)}
      />
      <datalist id={`${id}-zones`}>
        {ZONES.map((zone) => (
          <option key={zone} value={zone} />
        ))}
      </datalist>
    </>
  );
}

import type {
  DeviceCompensation,
  ProbeKind,
  TemperatureSensor,
} from '../../../../../shared/contracts/vocabulary.ts';
import {
  deviceCompensations,
  probeKinds,
  temperatureSensors,
} from '../../../../../shared/contracts/vocabulary.ts';
import {
  DEVICE_COMPENSATION_LABELS,
  PROBE_KIND_LABELS,
  TEMPERATURE_SENSOR_LABELS,
} from '../../../../../shared/format/labels.ts';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';

/** What the nameplate says, while it is being typed. */
export interface ProbeDraft {
  serial: string;
  tag: string;
  kind: ProbeKind;
  nominalCellConstantPerCm: number | null;
  rangeLowUsCm: number | null;
  rangeHighUsCm: number | null;
  resolutionUsCm: number | null;
  temperatureSensor: TemperatureSensor;
  deviceCompensation: DeviceCompensation;
  notes: string;
}

export interface ProbeFieldsProps {
  draft: ProbeDraft;
  onChange: (draft: ProbeDraft) => void;
  issueFor: (path: string) => string | undefined;
  /** The kind is fixed once the probe is registered. */
  hasKind: boolean;
}

export function ProbeFields({ draft, onChange, issueFor, hasKind }: ProbeFieldsProps) {
  const set = <Key extends keyof ProbeDraft>(key: Key, value: ProbeDraft[Key]) =>
    onChange({ ...draft, [key]: value });
  const numberField = (key: NumberKey, label: string, unit: string, isOptional = false) => (
    <Field label={label} isOptional={isOptional} error={issueFor(key)}>
      <NumberInput unit={unit} value={draft[key]} onChange={(value) => set(key, value)} />
    </Field>
  );
  return (
    <>
      <div className="form-pair">
        <Field label="Serial number" hint="As on the nameplate." error={issueFor('serial')}>
          <TextInput value={draft.serial} onChange={(event) => set('serial', event.target.value)} />
        </Field>
        <Field label="Tag" hint="What people call it: letters, digits, hyphens." error={issueFor('tag')}>
          <TextInput
            value={draft.tag}
            autoCapitalize="none"
            onChange={(event) => set('tag', event.target.value)}
          />
        </Field>
      </div>
      <div className="form-pair">
        {hasKind ? (
          <Field label="Kind" error={issueFor('kind')}>
            <Select
              options={optionsFrom(probeKinds, PROBE_KIND_LABELS)}
              value={draft.kind}
              onChange={(event) => set('kind', event.target.value as ProbeKind)}
            />
          </Field>
        ) : null}
        {numberField('nominalCellConstantPerCm', 'Nominal cell constant', 'cm⁻¹')}
      </div>
      <div className="form-pair">
        {numberField('rangeLowUsCm', 'Range from', 'µS/cm')}
        {numberField('rangeHighUsCm', 'Range to', 'µS/cm')}
      </div>
      <div className="form-pair">
        <Field label="Temperature sensor" error={issueFor('temperatureSensor')}>
          <Select
            options={optionsFrom(temperatureSensors, TEMPERATURE_SENSOR_LABELS)}
            value={draft.temperatureSensor}
            onChange={(event) => set('temperatureSensor', event.target.value as TemperatureSensor)}
          />
        </Field>
        {numberField('resolutionUsCm', 'Resolution', 'µS/cm', true)}
      </div>
      <Field
        label="Compensation on its own display"
        hint="Readings come raw and are taken to the reference temperature here."
        error={issueFor('deviceCompensation')}
      >
        <Select
          options={optionsFrom(deviceCompensations, DEVICE_COMPENSATION_LABELS)}
          value={draft.deviceCompensation}
          onChange={(event) => set('deviceCompensation', event.target.value as DeviceCompensation)}
        />
      </Field>
      <Field label="Notes" isOptional error={issueFor('notes')}>
        <Textarea rows={2} value={draft.notes} onChange={(event) => set('notes', event.target.value)} />
      </Field>
    </>
  );
}

type NumberKey = 'nominalCellConstantPerCm' | 'rangeLowUsCm' | 'rangeHighUsCm' | 'resolutionUsCm';

/** What is plainly missing, said before the server is asked. */
export function draftIssues(draft: ProbeDraft): Partial<Record<keyof ProbeDraft, string>> {
  const noNumber = (value: number | null) => value === null || Number.isNaN(value);
  return {
    ...(draft.serial.trim() ? {} : { serial: 'Write the serial number from the nameplate.' }),
    ...(draft.tag.trim() ? {} : { tag: 'Write the tag that people call it by.' }),
    ...(noNumber(draft.nominalCellConstantPerCm)
      ? { nominalCellConstantPerCm: 'Write the nominal cell constant as a number, such as 0.5.' }
      : {}),
    ...(noNumber(draft.rangeLowUsCm) ? { rangeLowUsCm: 'Write where the range begins, often 0.' } : {}),
    ...(noNumber(draft.rangeHighUsCm) ? { rangeHighUsCm: 'Write where the range ends.' } : {}),
    ...(Number.isNaN(draft.resolutionUsCm) ? { resolutionUsCm: 'Write a number, or leave it empty.' } : {}),
  };
}

/** The draft as the contracts take it. */
export function contentOf(draft: ProbeDraft) {
  return {
    ...draft,
    notes: draft.notes.trim() || null,
    nominalCellConstantPerCm: draft.nominalCellConstantPerCm ?? Number.NaN,
    rangeLowUsCm: draft.rangeLowUsCm ?? Number.NaN,
    rangeHighUsCm: draft.rangeHighUsCm ?? Number.NaN,
  };
}

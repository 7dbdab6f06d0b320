import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import type { CaptureStep } from '../../../../../shared/contracts/vocabulary.ts';
import type { ConductivityUnit } from '../../../../../shared/format/numbers.ts';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { RadioGroup } from '../../../components/ui/radio-group.tsx';
import type { Comparison } from './bench-figures.ts';

export interface TypedValues {
  /** µS/cm, whatever unit the field shows. */
  conductivityUsCm: number | null;
  temperatureC: number | null;
}

export interface TypedEntryProps {
  values: TypedValues;
  /** Fixed for the step: a unit that could be chosen could be chosen wrongly. */
  unit: ConductivityUnit;
  onChange: (values: TypedValues) => void;
  /** Far from the other readings of this step. */
  isFar: boolean;
}

const perUnit = (unit: ConductivityUnit): number => (unit === 'mS/cm' ? 1000 : 1);

/** Only while the probe's own readings do not come: its display is read and typed. */
export function TypedEntry({ values, unit, onChange, isFar }: TypedEntryProps) {
  const factor = perUnit(unit);
  const shown = values.conductivityUsCm === null ? null : values.conductivityUsCm / factor;
  return (
    <div className="bench-fields">
      <p className="bench-note">
        Read the transmitter’s display and type both values, raw and uncompensated. As soon as the probe is
        heard again, its own readings are taken.
      </p>
      <Field
        label="Conductivity, raw"
        error={isFar ? 'Far from the other readings here. Check the unit and the decimal point.' : null}
      >
        <NumberInput
          value={shown}
          unit={unit}
          onChange={(value) =>
            onChange({ ...values, conductivityUsCm: value === null ? null : value * factor })
          }
        />
      </Field>
      <Field label="Temperature on the display">
        <NumberInput
          value={values.temperatureC}
          unit="°C"
          onChange={(temperatureC) => onChange({ ...values, temperatureC })}
        />
      </Field>
    </div>
  );
}

export interface ReferenceValues {
  temperatureC: number | null;
  conductivityUsCm: number | null;
  comparedWith: Comparison;
}

export interface ReferenceEntryProps {
  step: CaptureStep;
  unit: ConductivityUnit;
  run: Calibration;
  values: ReferenceValues;
  onChange: (values: ReferenceValues) => void;
}

const COMPARISONS: readonly { value: Comparison; label: string }[] = [
  { value: 'nothing', label: 'nothing, the reading alone' },
  { value: 'portable-meter', label: 'a portable meter in the same water' },
  { value: 'grab-sample', label: 'a grab sample taken now' },
];

/** What an instrument without a stream shows: the thermometer, or a portable meter in the process. */
export function ReferenceEntry({ step, unit, run, values, onChange }: ReferenceEntryProps) {
  if (step === 'temperature-sensor') {
    return (
      <div className="bench-fields">
        <Field
          label={`Thermometer ${run.thermometer?.code ?? ''}`.trim()}
          hint="Beside the probe, in the same liquid, when both have settled."
        >
          <NumberInput
            value={values.temperatureC}
            unit="°C"
            onChange={(temperatureC) => onChange({ ...values, temperatureC })}
          />
        </Field>
      </div>
    );
  }
  if (step !== 'as-found-process') return null;
  const factor = perUnit(unit);
  return (
    <div className="bench-fields">
      <RadioGroup
        legend="Compared with"
        options={COMPARISONS}
        value={values.comparedWith}
        onChange={(value) =>
          onChange({
            ...values,
            comparedWith: COMPARISONS.find((one) => one.value === value)?.value ?? 'nothing',
          })
        }
      />
      {values.comparedWith === 'portable-meter' ? (
        <Field label="Portable meter, raw" hint="In the same water at the same moment, uncompensated.">
          <NumberInput
            value={values.conductivityUsCm === null ? null : values.conductivityUsCm / factor}
            unit={unit}
            onChange={(value) =>
              onChange({ ...values, conductivityUsCm: value === null ? null : value * factor })
            }
          />
        </Field>
      ) : null}
    </div>
  );
}

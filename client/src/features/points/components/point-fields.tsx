import {
  compensationModels,
  criticalities,
  decisionRules,
  displayUnits,
  hazardTags,
  intervalMethods,
} from '../../../../../shared/contracts/vocabulary.ts';
import { HAZARD_CAUTIONS } from '../../../../../shared/format/cautions.ts';
import {
  capitalise,
  CRITICALITY_LABELS,
  DECISION_RULE_LABELS,
  DECISION_RULE_SENTENCES,
  DISPLAY_UNIT_LABELS,
  INTERVAL_METHOD_LABELS,
} from '../../../../../shared/format/labels.ts';
import { Checkbox } from '../../../components/ui/checkbox.tsx';
import { Field, FieldGroup } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import type { PointDraft } from '../draft.ts';
import { COMPENSATION_NAMES, largerUnit } from '../model.ts';

export interface PointFieldsProps {
  draft: PointDraft;
  onChange: (draft: PointDraft) => void;
  issueFor: (path: string) => string | undefined;
}

/** What the point is for, and who must know. */
export function PurposeFields({ draft, onChange, issueFor }: PointFieldsProps) {
  const set = setterOf(draft, onChange);
  return (
    <>
      <div className="form-pair">
        <Field label="Name" hint="As people at the site call it." error={issueFor('name')}>
          <TextInput value={draft.name} onChange={(event) => set('name', event.target.value)} />
        </Field>
        <Field label="Medium" hint="What flows there." error={issueFor('medium')}>
          <TextInput value={draft.medium} onChange={(event) => set('medium', event.target.value)} />
        </Field>
      </div>
      <Field
        label="What the reading decides"
        hint="In a few words: the tolerance follows from it."
        error={issueFor('duty')}
      >
        <TextInput value={draft.duty} onChange={(event) => set('duty', event.target.value)} />
      </Field>
      <div className="form-pair">
        <Field label="Criticality" error={issueFor('criticality')}>
          <Select
            options={optionsFrom(criticalities, CRITICALITY_LABELS)}
            value={draft.criticality}
            onChange={(event) => set('criticality', event.target.value as PointDraft['criticality'])}
          />
        </Field>
        <Field
          label="What acts on this signal"
          isOptional
          hint="Shown before anybody touches the probe."
          error={issueFor('controlNote')}
        >
          <Textarea
            rows={2}
            maxLength={1000}
            value={draft.controlNote}
            onChange={(event) => set('controlNote', event.target.value)}
          />
        </Field>
      </div>
      <FieldGroup
        legend="Hazards there"
        hint="Each brings its caution before the step that needs it."
        error={issueFor('hazardTags')}
      >
        <div className="choices">
          {hazardTags.map((tag) => (
            <Checkbox
              key={tag}
              label={capitalise(HAZARD_CAUTIONS[tag].label)}
              isChecked={draft.hazardTags.includes(tag)}
              onChange={(isChecked) =>
                set(
                  'hazardTags',
                  hazardTags.filter((one) => (one === tag ? isChecked : draft.hazardTags.includes(one))),
                )
              }
            />
          ))}
        </div>
      </FieldGroup>
    </>
  );
}

/** What a reading there must satisfy. */
export function RequirementFields({ draft, onChange, issueFor }: PointFieldsProps) {
  const set = setterOf(draft, onChange);
  return (
    <>
      <div className="form-pair">
        <Field
          label="Tolerance"
          hint="Maximum permissible error of the reading, to both sides."
          error={issueFor('tolerancePercent')}
        >
          <NumberInput
            unit="%"
            value={draft.tolerancePercent}
            onChange={(value) => set('tolerancePercent', value)}
          />
        </Field>
        <Field
          label="Decision rule"
          hint={DECISION_RULE_SENTENCES[draft.decisionRule]}
          error={issueFor('decisionRule')}
        >
          <Select
            options={optionsFrom(decisionRules, DECISION_RULE_LABELS)}
            value={draft.decisionRule}
            onChange={(event) => set('decisionRule', event.target.value as PointDraft['decisionRule'])}
          />
        </Field>
      </div>
      <div className="form-pair">
        <Field label="Interval" hint="Until the next comparison is due." error={issueFor('intervalDays')}>
          <NumberInput
            unit="days"
            value={draft.intervalDays}
            onChange={(value) => set('intervalDays', value)}
          />
        </Field>
        <Field label="Interval is reviewed by" error={issueFor('intervalMethod')}>
          <Select
            options={optionsFrom(intervalMethods, INTERVAL_METHOD_LABELS)}
            value={draft.intervalMethod}
            onChange={(event) => set('intervalMethod', event.target.value as PointDraft['intervalMethod'])}
          />
        </Field>
      </div>
    </>
  );
}

/** How its value is stated, and between which limits the process keeps it. */
export function ValueFields({ draft, onChange, issueFor }: PointFieldsProps) {
  const set = setterOf(draft, onChange);
  const limit = (key: 'lowLimitUsCm' | 'highLimitUsCm', label: string) => (
    <Field label={label} isOptional hint={largerUnit(draft[key])} error={issueFor(key)}>
      <NumberInput unit="µS/cm" value={draft[key]} onChange={(value) => set(key, value)} />
    </Field>
  );
  return (
    <>
      <div className="form-pair">
        <Field
          label="Compensation"
          hint="How a raw reading is taken to the reference temperature."
          error={issueFor('compensationModel')}
        >
          <Select
            options={optionsFrom(compensationModels, COMPENSATION_NAMES)}
            value={draft.compensationModel}
            onChange={(event) =>
              set('compensationModel', event.target.value as PointDraft['compensationModel'])
            }
          />
        </Field>
        {draft.compensationModel === 'linear' ? (
          <Field label="Coefficient" error={issueFor('compensationCoefficientPercentPerK')}>
            <NumberInput
              unit="%/K"
              value={draft.compensationCoefficientPercentPerK}
              onChange={(value) => set('compensationCoefficientPercentPerK', value)}
            />
          </Field>
        ) : null}
      </div>
      <div className="form-pair">
        <Field label="Reference temperature" error={issueFor('referenceTemperatureC')}>
          <NumberInput
            unit="°C"
            value={draft.referenceTemperatureC}
            onChange={(value) => set('referenceTemperatureC', value)}
          />
        </Field>
        <Field label="Shown in" error={issueFor('displayUnit')}>
          <Select
            options={optionsFrom(displayUnits, DISPLAY_UNIT_LABELS)}
            value={draft.displayUnit}
            onChange={(event) => set('displayUnit', event.target.value as PointDraft['displayUnit'])}
          />
        </Field>
      </div>
      <div className="form-pair">
        {limit('lowLimitUsCm', 'Low limit')}
        {limit('highLimitUsCm', 'High limit')}
      </div>
    </>
  );
}

function setterOf(draft: PointDraft, onChange: (draft: PointDraft) => void) {
  return <Key extends keyof PointDraft>(key: Key, value: PointDraft[Key]) =>
    onChange({ ...draft, [key]: value });
}

import type { Setting, SettingKey } from '../../../../shared/contracts/settings.ts';
import { formatNumber } from '../../../../shared/format/numbers.ts';

export interface SettingField {
  name: string;
  label: string;
  hint: string;
  /** Absent for text. */
  unit?: string;
}

export interface SettingGroup {
  key: SettingKey;
  title: string;
  note: string;
  fields: readonly SettingField[];
}

/** What an administrator can set, as people read it; the server knows the limits. */
export const SETTING_GROUPS: readonly SettingGroup[] = [
  {
    key: 'organisation',
    title: 'Organisation',
    note: 'stands on records and in mail',
    fields: [{ name: 'name', label: 'Name', hint: 'As it shall stand on records.' }],
  },
  {
    key: 'check-fitness',
    title: 'When a reading needs care',
    note: 'for every point that has no stricter rule',
    fields: [
      {
        name: 'overdueFactor',
        label: 'A comparison is overdue after',
        hint: 'Times the interval of the point, 1 to 3. Then the reading is to be used with care.',
        unit: '× interval',
      },
      {
        name: 'silentIntervals',
        label: 'A probe is silent after',
        hint: 'Reading intervals without a message, 2 to 100. Then there is no signal.',
        unit: 'intervals',
      },
    ],
  },
  {
    key: 'due-dates',
    title: 'When work is announced',
    note: 'to managers, by a line on their pages and a mail',
    fields: [
      {
        name: 'dueSoonDays',
        label: 'A calibration is due soon',
        hint: 'Days before its date, 1 to 120.',
        unit: 'days before',
      },
    ],
  },
  {
    key: 'check-uncertainty',
    title: 'What U takes for granted',
    note: 'in automatic checks, where no measured value is known',
    fields: [
      {
        name: 'temperatureStandardUncertaintyC',
        label: 'Standard uncertainty of the temperature',
        hint: '0.05 K is common practice for a class A sensor in a stirred flow cell.',
        unit: 'K',
      },
      {
        name: 'repeatabilityPercent',
        label: 'Repeatability of the reading',
        hint: 'As a standard uncertainty; 0.1 % is common practice in a flow cell.',
        unit: '%',
      },
    ],
  },
];

export type SettingDraft = Readonly<Record<string, string | number | null>>;

/** The stored values of one group by the names of its fields. */
export function draftOf(group: SettingGroup, setting: Setting): SettingDraft {
  const value = (setting.value ?? {}) as Record<string, string | number>;
  return Object.fromEntries(
    group.fields.map((field) => [field.name, value[field.name] ?? (field.unit ? null : '')]),
  );
}

/** One value as it is printed. */
export function valueText(field: SettingField, value: string | number | null | undefined): string {
  if (typeof value !== 'number') return value ?? '–';
  return formatNumber(value, field.unit === undefined ? {} : { unit: field.unit });
}

/** What is plainly missing, said before the server is asked; paths as the server names them. */
export function draftIssues(group: SettingGroup, draft: SettingDraft): Record<string, string> {
  const issues: Record<string, string> = {};
  for (const field of group.fields) {
    const value = draft[field.name];
    const isMissing =
      typeof value === 'number'
        ? Number.isNaN(value)
        : value === null || value === undefined || !value.trim();
    if (isMissing) issues[`value.${field.name}`] = field.unit ? 'Write a number.' : 'Write a name.';
  }
  return issues;
}

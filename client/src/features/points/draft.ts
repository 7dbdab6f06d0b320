import type { Point } from '../../../../shared/contracts/points.ts';
import type { Issues } from '../../lib/use-submission.ts';

/** The requirements of a point while they are being written; a number is null while its field is empty. */
export interface PointDraft extends Omit<
  Point,
  | 'id'
  | 'code'
  | 'areaId'
  | 'areaName'
  | 'siteId'
  | 'siteName'
  | 'probe'
  | 'hold'
  | 'retiredAt'
  | 'version'
  | 'can'
  | 'referenceTemperatureC'
  | 'tolerancePercent'
  | 'intervalDays'
  | 'controlNote'
> {
  areaId: number | null;
  referenceTemperatureC: number | null;
  tolerancePercent: number | null;
  intervalDays: number | null;
  controlNote: string;
}

/** A beginning that is common for process water; tolerance is left to whoever knows what the reading decides. */
export const EMPTY_DRAFT: PointDraft = {
  areaId: null,
  name: '',
  duty: '',
  medium: '',
  displayUnit: 'uS/cm',
  compensationModel: 'linear',
  compensationCoefficientPercentPerK: null,
  referenceTemperatureC: 25,
  lowLimitUsCm: null,
  highLimitUsCm: null,
  tolerancePercent: null,
  decisionRule: 'guarded-u',
  intervalDays: null,
  intervalMethod: 'fixed',
  criticality: 'medium',
  hazardTags: [],
  controlNote: '',
};

export function draftOfPoint(point: Point): PointDraft {
  const draft = Object.fromEntries(
    (Object.keys(EMPTY_DRAFT) as (keyof PointDraft)[]).map((key) => [key, point[key]]),
  ) as unknown as PointDraft;
  return { ...draft, controlNote: point.controlNote ?? '' };
}

/** What is plainly missing, said before the server is asked. */
export function pointIssues(draft: PointDraft): Issues {
  const issues: Record<string, string> = {};
  const needText = (key: 'name' | 'duty' | 'medium', says: string) => {
    if (!draft[key].trim()) issues[key] = says;
  };
  const needNumber = (key: 'tolerancePercent' | 'intervalDays' | 'referenceTemperatureC', says: string) => {
    const value = draft[key];
    if (value === null || Number.isNaN(value)) issues[key] = says;
  };
  const mayBeEmpty = ['lowLimitUsCm', 'highLimitUsCm', 'compensationCoefficientPercentPerK'] as const;
  if (draft.areaId === null) issues.areaId = 'Choose the area where it is.';
  needText('name', 'Write the name people know it by.');
  needText('duty', 'Write what the reading decides.');
  needText('medium', 'Write what flows there.');
  needNumber('tolerancePercent', 'Write the largest error that the process can bear, in per cent.');
  needNumber('intervalDays', 'Write after how many days the next comparison is due.');
  needNumber('referenceTemperatureC', 'Write the reference temperature, often 25.');
  for (const key of mayBeEmpty) {
    if (Number.isNaN(draft[key])) issues[key] = 'Write a number, or leave it empty.';
  }
  return issues;
}

/** The draft as the contracts take it. */
export function contentOfDraft(draft: PointDraft) {
  return {
    ...draft,
    // A coefficient belongs to the linear model only.
    compensationCoefficientPercentPerK:
      draft.compensationModel === 'linear' ? draft.compensationCoefficientPercentPerK : null,
    controlNote: draft.controlNote.trim() || null,
    areaId: draft.areaId ?? 0,
    referenceTemperatureC: draft.referenceTemperatureC ?? Number.NaN,
    tolerancePercent: draft.tolerancePercent ?? Number.NaN,
    intervalDays: draft.intervalDays ?? Number.NaN,
  };
}

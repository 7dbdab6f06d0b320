import { describe, expect, it } from 'vitest';
import { contentOfDraft, EMPTY_DRAFT, pointIssues } from '../../client/src/features/points/draft.ts';
import {
  compensationWords,
  largerUnit,
  limitWords,
  pointsSentence,
} from '../../client/src/features/points/model.ts';

describe('limits of the process', () => {
  it.each([
    [null, 500, 'uS/cm', 'at most 500 µS/cm'],
    [45_000, null, 'mS/cm', 'at least 45 mS/cm'],
    [8_000, 18_000, 'mS/cm', '8 to 18 mS/cm'],
    [null, null, 'uS/cm', null],
  ] as const)('%s and %s in %s read %s', (lowLimitUsCm, highLimitUsCm, displayUnit, words) => {
    expect(limitWords({ lowLimitUsCm, highLimitUsCm, displayUnit })).toBe(words);
  });

  it('are repeated in the larger unit once they are large, so that a zero too many shows', () => {
    expect(largerUnit(45_000)).toBe('= 45.00\u00a0mS/cm');
    expect(largerUnit(450)).toBeUndefined();
  });
});

it('names the coefficient and the reference of linear compensation', () => {
  const point = { compensationCoefficientPercentPerK: 1.95, referenceTemperatureC: 25 };
  expect(compensationWords({ ...point, compensationModel: 'linear' })).toBe(
    'linear, 1.95\u00a0%/K, to 25\u00a0°C',
  );
});

it('says how many points there are and which', () => {
  expect(pointsSentence(3, { free: '1' }, 'Lower Weir')).toBe(
    '3\u00a0measuring points at Lower Weir, without a probe.',
  );
});

describe('a point while it is written', () => {
  const whole = {
    ...EMPTY_DRAFT,
    areaId: 4,
    name: 'Permeate',
    duty: 'Releases the line',
    medium: 'Permeate',
    tolerancePercent: 3,
    intervalDays: 90,
  };

  it('names every field that is missing, and none that may stay empty', () => {
    expect(Object.keys(pointIssues(EMPTY_DRAFT)).sort()).toEqual([
      'areaId',
      'duty',
      'intervalDays',
      'medium',
      'name',
      'tolerancePercent',
    ]);
    expect(pointIssues(whole)).toEqual({});
  });

  it('refuses text where a number belongs', () => {
    expect(pointIssues({ ...whole, highLimitUsCm: Number.NaN })).toEqual({
      highLimitUsCm: 'Write a number, or leave it empty.',
    });
  });

  it('sends no coefficient with a model that has none', () => {
    const draft = {
      ...whole,
      compensationModel: 'ultrapure',
      compensationCoefficientPercentPerK: 2,
    } as const;
    expect(contentOfDraft(draft).compensationCoefficientPercentPerK).toBeNull();
  });
});

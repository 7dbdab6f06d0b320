import { expect, it } from 'vitest';
import { HttpProblem } from '../../client/src/lib/http.ts';
import { changedFields, refetchOnConflict } from '../../client/src/lib/refetch-on-conflict.ts';

it('fetches what is stored now when somebody was faster, and says what to do', async () => {
  let version = 3;
  const write = () => Promise.reject(new HttpProblem(409, { code: 'points.changed-meanwhile' }));
  const refetch = async () => {
    version = 4;
  };
  await expect(refetchOnConflict(write, refetch)).rejects.toThrow(/save again to put only your own changes/);
  expect(version).toBe(4);
});

it('passes every other refusal on as it is', async () => {
  const refusal = new HttpProblem(409, { code: 'points.occupied', title: 'A probe is installed there.' });
  let isFetched = false;
  const refetch = async () => {
    isFetched = true;
  };
  await expect(refetchOnConflict(() => Promise.reject(refusal), refetch)).rejects.toBe(refusal);
  expect(isFetched).toBe(false);
});

it('sends only what was changed, so that a second save cannot undo somebody else’s', () => {
  const base = { tolerancePercent: 3, hazardTags: ['hygiene'], name: 'Pond 4' };
  expect(changedFields(base, { ...base, tolerancePercent: 2, hazardTags: ['hygiene'] })).toEqual({
    tolerancePercent: 2,
  });
  expect(changedFields(base, { ...base, hazardTags: [] })).toEqual({ hazardTags: [] });
});

import { expect, it } from 'vitest';
import {
  isNarrowed,
  listSentence,
  probeFilters,
  sortOf,
  sortText,
  whereWords,
} from '../../client/src/features/probes/list-model.ts';

const from = (address: string) => {
  const params = new URLSearchParams(address);
  return probeFilters((name) => params.get(name) ?? '');
};

it('asks the server for what the address says', () => {
  expect(from('q=sk-1&siteId=2&kind=inductive&status=spare&trust=no-signal&sort=-lastSeen')).toEqual({
    q: 'sk-1',
    siteId: 2,
    kind: 'inductive',
    status: 'spare',
    trust: 'no-signal',
    sort: '-lastSeen',
  });
});

it('ignores what an address cannot mean instead of failing', () => {
  expect(from('siteId=0&kind=optical&trust=maybe&sort=colour')).toEqual({ sort: 'tag' });
});

it('knows that an order alone hides nothing', () => {
  expect(isNarrowed(from('sort=serial'))).toBe(false);
  expect(isNarrowed(from('kind=inductive'))).toBe(true);
});

it('keeps the order through head and address', () => {
  expect(sortOf('-lastSeen')).toEqual({ key: 'lastSeen', direction: 'descending' });
  expect(sortText({ key: 'tag', direction: 'descending' })).toBe('-tag');
});

it('says how many there are and what they were narrowed to', () => {
  expect(listSentence(44, from(''), null)).toBe('44\u00a0probes at all your sites.');
  expect(listSentence(1, from('kind=inductive&trust=do-not-use&siteId=1'), 'Skerry Point')).toBe(
    '1\u00a0probe at Skerry Point: inductive, do not use.',
  );
  expect(listSentence(0, from('q=zz'), null)).toBe(
    'No probe at all your sites: with “zz” in tag, serial number or point.',
  );
});

it('says of a probe without a point what it is and where it is kept', () => {
  expect(whereWords({ placement: null, status: 'spare', siteName: 'Quarrybank' })).toEqual({
    name: 'spare',
    note: 'kept at Quarrybank',
  });
});

import { expect, it } from 'vitest';
import { grantWords, peopleSentence, personState } from '../../client/src/features/users/model.ts';
import type { User } from '../../shared/contracts/users.ts';

const now = Date.parse('2026-12-01T13:22:00Z');

const person = (fields: Partial<User> = {}): User => ({
  id: 1,
  email: 'ines.falk@corrie.example',
  name: 'Ines Falk',
  grants: [{ id: 1, siteId: 2, siteName: 'Lower Weir', role: 'technician', endsOn: null }],
  hasPassword: true,
  lastSignInAt: '2026-11-30T07:00:00.000Z',
  lockedUntil: null,
  deactivatedAt: null,
  version: 0,
  can: { change: true, deactivate: true, unlock: false },
  ...fields,
});

it.each([
  ['works here', person(), 'signed in last on 30 Nov 2026 07:00 UTC+00:00', false],
  ['was invited', person({ hasPassword: false }), 'invited, has not set a password yet', true],
  [
    'is locked out',
    person({ lockedUntil: '2026-12-01T13:30:00.000Z' }),
    'locked until 1 Dec 2026 13:30 UTC+00:00',
    true,
  ],
  [
    'was locked out an hour ago',
    person({ lockedUntil: '2026-12-01T12:00:00.000Z' }),
    'signed in last on 30 Nov 2026 07:00 UTC+00:00',
    false,
  ],
  [
    'is deactivated, which outweighs everything',
    person({ deactivatedAt: '2026-11-02T08:00:00.000Z', hasPassword: false }),
    'deactivated on 2 Nov 2026',
    true,
  ],
  [
    'has only a role that is over',
    person({ grants: [{ id: 1, siteId: null, siteName: null, role: 'auditor', endsOn: '2026-11-30' }] }),
    'has no role in force',
    true,
  ],
])('says of somebody who %s how it stands', (_case, user, text, isNotable) => {
  expect(personState(user, now)).toEqual({ text, isNotable });
});

it('lets a role count on its last day', () => {
  const grant = { id: 1, siteId: null, siteName: null, role: 'auditor', endsOn: '2026-12-01' } as const;
  expect(grantWords(grant, '2026-12-01')).toBe('auditor, all sites, until 1 Dec 2026');
  expect(grantWords(grant, '2026-12-02')).toBe('auditor, all sites, ended 1 Dec 2026');
});

it('opens with who can sign in, and names who cannot', () => {
  const people = [person(), person({ id: 2, name: 'Noor Vane', hasPassword: false })];
  expect(peopleSentence(people, now)).toEqual({
    all: 'One person can sign in.',
    exception: 'Noor Vane cannot, as things are.',
  });
});

import { expect, it } from 'vitest';
import { mailState, textWithLinks } from '../../client/src/features/mails/model.ts';

it('sets an address apart so that it can be followed, without the full stop after it', () => {
  expect(textWithLinks('Open http://127.0.0.1:4280/set-password?token=a1_b.\nThen sign in.')).toEqual([
    { text: 'Open ' },
    {
      text: 'http://127.0.0.1:4280/set-password?token=a1_b',
      href: 'http://127.0.0.1:4280/set-password?token=a1_b',
    },
    { text: '.\nThen sign in.' },
  ]);
});

it('makes no link of anything but a web address', () => {
  expect(textWithLinks('javascript:alert(1) and mailto:a@b.example')).toEqual([
    { text: 'javascript:alert(1) and mailto:a@b.example' },
  ]);
});

it('says whether a mail has left, and why not', () => {
  expect(mailState({ sentAt: null, attempts: 0, lastError: null }).text).toBe('waits to leave');
  expect(mailState({ sentAt: null, attempts: 2, lastError: 'connection refused' })).toEqual({
    text: 'has not left after 2\u00a0attempts: connection refused',
    isNotable: true,
  });
  expect(mailState({ sentAt: '2026-12-01T13:22:00Z', attempts: 1, lastError: null }).isNotable).toBe(false);
});

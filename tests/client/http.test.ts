import { afterEach, expect, it, vi } from 'vitest';
import { http, HttpProblem, NetworkFailure, withQuery } from '../../client/src/lib/http.ts';
import { shouldRetry } from '../../client/src/lib/query-client.ts';

afterEach(() => vi.unstubAllGlobals());

const answer = (status: number, body: unknown, headers: Record<string, string> = {}) =>
  vi.stubGlobal('fetch', () =>
    Promise.resolve(
      new Response(body === undefined ? null : JSON.stringify(body), {
        status,
        headers: {
          'content-type': status < 400 ? 'application/json' : 'application/problem+json',
          ...headers,
        },
      }),
    ),
  );

it('gives the answer as it stands', async () => {
  answer(200, { items: [], total: 0, nextCursor: null });
  await expect(http.get('/api/probes')).resolves.toEqual({ items: [], total: 0, nextCursor: null });
});

it('gives nothing for an answer without content', async () => {
  answer(204, undefined);
  await expect(http.delete('/api/sessions/current')).resolves.toBeUndefined();
});

it('carries a refusal whole: code, sentence, fields and request id', async () => {
  answer(422, {
    title: 'Some fields need another look.',
    detail: 'One field needs another look.',
    code: 'request.invalid',
    requestId: '01JE6M0T6Y',
    issues: [{ path: 'cellConstantPerCm', message: 'Must be above 0.' }],
  });
  const refusal = await http.post('/api/probes', {}).catch((error: unknown) => error);
  expect(refusal).toBeInstanceOf(HttpProblem);
  expect(refusal).toMatchObject({ status: 422, code: 'request.invalid', requestId: '01JE6M0T6Y' });
  expect((refusal as HttpProblem).message).toBe('One field needs another look.');
  expect((refusal as HttpProblem).issueFor('cellConstantPerCm')).toBe('Must be above 0.');
});

it('survives a refusal that is no problem document, as a proxy sends it', async () => {
  vi.stubGlobal('fetch', () => Promise.resolve(new Response('<h1>Bad gateway</h1>', { status: 502 })));
  await expect(http.get('/api/probes')).rejects.toMatchObject({ status: 502, code: 'request.unknown' });
});

it('tells a lost connection from a refusal', async () => {
  vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')));
  await expect(http.get('/api/probes')).rejects.toBeInstanceOf(NetworkFailure);
});

it('leaves empty values out of an address and repeats the key of a list', () => {
  expect(
    withQuery('/api/probes', { q: '', siteId: 3, kind: ['inductive', 'two-electrode'], cursor: null }),
  ).toBe('/api/probes?siteId=3&kind=inductive&kind=two-electrode');
});

it('asks again after a lost connection and never after a refusal', () => {
  expect(shouldRetry(0, new NetworkFailure(null))).toBe(true);
  expect(shouldRetry(0, new HttpProblem(503, {}))).toBe(true);
  expect(shouldRetry(0, new HttpProblem(403, {}))).toBe(false);
  expect(shouldRetry(2, new NetworkFailure(null))).toBe(false);
});

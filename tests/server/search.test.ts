import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Probe, Site } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aPoint, aProbe, aSite, installed } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let probe: Probe;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ name: 'Lower Weir' });
  other = await aSite({ name: 'Quarrybank' });
  probe = await aProbe(site.id, { tag: 'cip-2', serial: 'FX-2231' });
  const point = await aPoint(site.id, { code: 'LWR-CIP-2', name: 'Caustic return' });
  await installed(probe, point, (await app.person('technician')).id);
  await aProbe(site.id, { tag: 'cip-21', serial: 'FX-9000' });
  await aProbe(site.id, {
    tag: 'cip-2x',
    serial: 'FX-0001',
    status: 'retired',
    retiredAt: new Date('2026-06-01T00:00:00Z'),
    retiredReason: 'cracked body',
  });
  await aProbe(other.id, { tag: 'boiler-2', serial: 'FX-2232' });
});
afterAll(() => app.stop());

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/search?q=cip'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'nothing to look for',
      who: 'operator',
      ask: () => ['get', '/api/search?q=%20'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.q',
    },
    {
      says: 'a null character',
      who: 'operator',
      ask: () => ['get', '/api/search?q=a%00b'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.q',
    },
  ],
);

interface Hit {
  kind: string;
  title: string;
  subtitle: string;
  probeId: number | null;
}

describe('search', () => {
  const search = async (text: string): Promise<Hit[]> => {
    const agent = await app.as('operator');
    return (await agent.get(`/api/search?q=${encodeURIComponent(text)}`).expect(200)).body.items as Hit[];
  };

  it('puts the exact match first and the retired last', async () => {
    const hits = await search('CIP-2');
    expect(hits.map(({ title }) => title)).toEqual([
      'cip-2 · FX-2231',
      'cip-21 · FX-9000',
      'LWR-CIP-2 · Caustic return',
      'cip-2x · FX-0001',
    ]);
    expect(hits[0]).toMatchObject({
      kind: 'probe',
      subtitle: expect.stringMatching(/^Lower Weir · .* · Caustic return$/),
    });
    expect(hits[2]).toMatchObject({ kind: 'point', probeId: probe.id });
  });

  it('finds by serial and by name', async () => {
    expect((await search('fx-22')).map(({ title }) => title)).toEqual([
      'boiler-2 · FX-2232',
      'cip-2 · FX-2231',
    ]);
    expect((await search('caustic')).map(({ kind }) => kind)).toEqual(['point']);
  });

  it('takes wildcards literally', async () => {
    expect(await search('%')).toEqual([]);
    expect(await search('cip_2')).toEqual([]);
  });

  it('shows nothing of other sites', async () => {
    const agent = await app.as({ role: 'manager', siteId: other.id });
    const { body } = await agent.get('/api/search?q=fx').expect(200);
    expect(body.items.map((one: Hit) => one.title)).toEqual(['boiler-2 · FX-2232']);
  });
});

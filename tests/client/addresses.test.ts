import { describe, expect, it } from 'vitest';
import { areasFor, siteItems } from '../../client/src/routes/areas.ts';
import { paths, returnAddress } from '../../client/src/paths.ts';
import type { Session } from '../../shared/contracts/sessions.ts';

const session = (readAudit: boolean): Session => ({
  user: { id: 1, email: 'operator@corrie.example', name: 'Odile Marsh' },
  grants: [],
  startedAt: '2026-12-01T13:00:00.000Z',
  can: {
    readAudit,
    managePeople: false,
    manageSettings: false,
    readMail: false,
    readQuarantine: false,
    createSite: false,
    createPoint: false,
    registerProbe: false,
    createStandard: false,
    prepareStandard: false,
    createInstrument: false,
  },
});

describe('addresses', () => {
  it('are written from their pattern, with empty query values left out', () => {
    expect(paths.probe.to({ id: 12 })).toBe('/probes/12');
    expect(paths.probes.to({ siteId: null, q: 'sk' })).toBe('/probes?q=sk');
    expect(paths.liveWall.to({ siteId: 3 })).toBe('/live/3/wall');
  });

  it('lead back after sign-in, but never to another site', () => {
    expect(returnAddress('/probes/12?tab=1')).toBe('/probes/12?tab=1');
    for (const foreign of [
      '//evil.example',
      'https://evil.example',
      '/\\evil.example',
      '',
      null,
      '/sign-in',
    ]) {
      expect(returnAddress(foreign)).toBe('/live');
    }
  });
});

describe('the rail', () => {
  it('shows the records only to whoever may read them', () => {
    const labels = (readAudit: boolean) => areasFor(session(readAudit), null).map((area) => area.label);
    expect(labels(true)).toContain('Records');
    expect(labels(false)).not.toContain('Records');
  });

  it('keeps the site in view from area to area', () => {
    expect(areasFor(session(false), 3).map((area) => area.to)).toEqual(
      expect.arrayContaining(['/live/3', '/probes?siteId=3']),
    );
  });

  it('switches the site inside the area one is in', () => {
    const sites = [
      { id: 1, name: 'Skerry Point' },
      { id: 2, name: 'Lower Weir' },
    ];
    expect(siteItems(sites, 2, '/live/2').items.map((item) => item.to)).toEqual([
      '/live',
      '/live/1',
      '/live/2',
    ]);
    expect(siteItems(sites, 2, '/probes').items.map((item) => item.to)).toEqual([
      '/probes',
      '/probes?siteId=1',
      '/probes?siteId=2',
    ]);
    expect(siteItems(sites, 2, '/live/2').current).toBe('Lower Weir');
  });
});

import { describe, expect, it } from 'vitest';
import {
  contentOfLot,
  EMPTY_LOT,
  lotIssues,
  readTemperatureTable,
} from '../../client/src/features/standards/draft.ts';
import {
  certifiedNote,
  certifiedQuantity,
  inUseFirst,
  lotsSentence,
  lotState,
  solutionName,
} from '../../client/src/features/standards/model.ts';
import type { Standard } from '../../shared/contracts/standards.ts';

const lot = (fields: Partial<Standard> = {}): Standard => ({
  id: 1,
  code: 'KC-26-031',
  label: '',
  producer: 'Brinefold Reference Solutions',
  product: 'Potassium chloride 0.01 mol/kg',
  medium: 'kcl-aqueous',
  basis: 'molal',
  nominal: 0.01,
  certifiedConductivityUsCm: 1408.2,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: 3.52,
  coverageFactor: 2,
  coverageProbabilityPercent: null,
  temperatureTable: null,
  traceability: 'certificate 1',
  isInHouse: false,
  issuedOn: '2026-01-06',
  expiresOn: '2028-01-06',
  openedLifeDays: null,
  storage: '',
  state: 'released',
  stateReason: null,
  stateChangedAt: '2026-01-08T00:00:00.000Z',
  isExpired: false,
  isUsable: true,
  checkCount: 0,
  certificate: null,
  preparation: null,
  version: 0,
  can: {
    release: false,
    quarantine: true,
    recall: true,
    attachCertificate: false,
    receiveBottles: false,
    dilute: false,
  },
  ...fields,
});

it('never writes a nominal value without its basis', () => {
  expect(solutionName(lot())).toBe('KCl 0.01 mol/kg (molal)');
  expect(solutionName(lot({ basis: 'demal' }))).toBe('KCl 0.01 D (demal)');
  expect(solutionName(lot({ basis: 'molar' }))).toBe('KCl 0.01 mol/L at 25 °C (molar)');
  expect(solutionName(lot({ basis: 'other', nominal: null, product: 'Dilute KCl, 84 µS/cm' }))).toBe(
    'Dilute KCl, 84 µS/cm',
  );
});

it('prints the certified value with its U, its k and its temperature', () => {
  expect(certifiedQuantity(lot())?.text.replaceAll('\u00a0', ' ')).toBe('1\u2009408.2 ± 3.5 µS/cm');
  expect(certifiedNote(lot())).toBe('at 25\u00a0°C, k = 2');
  expect(certifiedQuantity(lot({ certifiedConductivityUsCm: null }))).toBeNull();
});

describe('whether a lot may be used', () => {
  it.each([
    ['a released one', lot(), 'released for use', 'plain'],
    ['one past its last day', lot({ isExpired: true }), 'past its last day', 'care'],
    ['one in quarantine', lot({ state: 'quarantined', isExpired: true }), 'in quarantine', 'care'],
    ['a recalled one, whatever else it is', lot({ state: 'recalled', isExpired: true }), 'recalled', 'stop'],
  ])('is said in words: %s', (_case, given, word, tone) => {
    expect(lotState(given)).toMatchObject({ word, tone });
  });

  it('puts those in use first, the newest code above', () => {
    const lots = [
      lot({ code: 'KC-24-011', isUsable: false }),
      lot({ code: 'KC-25-9' }),
      lot({ code: 'KC-25-10' }),
    ];
    expect(inUseFirst(lots).map((one) => one.code)).toEqual(['KC-25-10', 'KC-25-9', 'KC-24-011']);
  });

  it('opens the page with how many, and what was withdrawn', () => {
    const lots = [
      lot(),
      lot({ state: 'recalled', isUsable: false }),
      lot({ isExpired: true, isUsable: false }),
    ];
    expect(lotsSentence(lots)).toEqual({ all: 'One lot may be used today.', exception: 'One is recalled.' });
  });
});

describe('a certificate’s temperature table', () => {
  it('is read as pasted: spaces, tabs or semicolons, point or comma, empty lines', () => {
    expect(readTemperatureTable('20 75.9\n\n25\t84,0\n30; 92.1\n')).toEqual({
      rows: [
        { temperatureC: 20, conductivityUsCm: 75.9 },
        { temperatureC: 25, conductivityUsCm: 84 },
        { temperatureC: 30, conductivityUsCm: 92.1 },
      ],
      fault: null,
    });
  });

  it('names the line that cannot be read', () => {
    expect(readTemperatureTable('20 75.9\n25 about 84').fault).toMatch(/^Line 2 needs two numbers/);
  });
});

it('names every field of a certificate that is missing', () => {
  expect(Object.keys(lotIssues(EMPTY_LOT)).sort()).toEqual([
    'code',
    'expiresOn',
    'issuedOn',
    'producer',
    'product',
    'traceability',
  ]);
});

it('sends no nominal value with a lot that has no basis, and no k without a U', () => {
  expect(contentOfLot({ ...EMPTY_LOT, basis: 'other' })).toMatchObject({
    nominal: null,
    coverageFactor: null,
    temperatureTable: null,
  });
});

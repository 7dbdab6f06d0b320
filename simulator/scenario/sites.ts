import type { SiteSeed } from './types.ts';

export const organisationName = 'Corrie Sound Utilities';

export const sites: SiteSeed[] = [
  {
    key: 'skerry-point',
    code: 'SP',
    name: 'Skerry Point',
    purpose: 'Desalination: sea water in, drinking water out',
    timeZone: 'Europe/London',
    access: 'One technician a day; intake work only around low water, mornings.',
    areas: [
      { key: 'seawater-feed', name: 'Seawater feed' },
      { key: 'permeate', name: 'Permeate' },
      { key: 'remineralised', name: 'Remineralised water' },
      { key: 'outfall-cleaning', name: 'Outfall and cleaning' },
    ],
  },
  {
    key: 'lower-weir',
    code: 'LW',
    name: 'Lower Weir',
    purpose: 'Dairy: cleaning in place and rinse water',
    timeZone: 'Europe/London',
    access: 'No access in the two weeks around the new year. Hairnet and clean boots at the hygiene line.',
    areas: [
      { key: 'cleaning-station', name: 'Cleaning station' },
      { key: 'lines', name: 'Filling lines' },
      { key: 'services', name: 'Services' },
    ],
  },
  {
    key: 'quarrybank',
    code: 'QB',
    name: 'Quarrybank',
    purpose: 'Boiler house: feed, condensate, blowdown',
    timeZone: 'Europe/London',
    access: 'Hot work only in the outage weeks; report to the boiler attendant first.',
    areas: [
      { key: 'feed-water', name: 'Feed water' },
      { key: 'condensate', name: 'Condensate' },
      { key: 'boilers', name: 'Boilers' },
    ],
  },
  {
    key: 'hollow-fen',
    code: 'HF',
    name: 'Hollow Fen',
    purpose: 'Hatchery: brackish ponds and fry hall',
    timeZone: 'Europe/London',
    access: 'Biosecurity: one pond a visit, footbath and fresh gloves between ponds.',
    areas: [
      { key: 'inlet', name: 'Inlet' },
      { key: 'ponds', name: 'Ponds' },
      { key: 'hall', name: 'Fry hall' },
    ],
  },
];

import { Instrument } from '../../server/db/models/index.ts';
import type { InstrumentKind } from '../../shared/contracts/vocabulary.ts';
import { storeCertificate } from './certificates.ts';
import { dayMs, dayOf, type Loading } from './loading.ts';

interface InstrumentSeed {
  code: string;
  kind: InstrumentKind;
  name: string;
  serial: string;
  expandedUncertainty: number;
  uncertaintyUnit: 'C' | 'percent' | 'uS/cm' | 'ohm' | 'g';
  correction: number;
  issuedDaysAgo: number;
  dueInDays: number;
}

/** Invented makes and numbers. One thermometer is past its due date, so that the list has its exception. */
const seeds: readonly InstrumentSeed[] = [
  {
    code: 'RT-05',
    kind: 'thermometer',
    name: 'Platinum thermometer, hand-held',
    serial: '20-4417',
    expandedUncertainty: 0.05,
    uncertaintyUnit: 'C',
    correction: -0.02,
    issuedDaysAgo: 140,
    dueInDays: 225,
  },
  {
    code: 'RT-06',
    kind: 'thermometer',
    name: 'Platinum thermometer, hand-held',
    serial: '20-4418',
    expandedUncertainty: 0.05,
    uncertaintyUnit: 'C',
    correction: 0.01,
    issuedDaysAgo: 133,
    dueInDays: 232,
  },
  {
    code: 'RT-07',
    kind: 'thermometer',
    name: 'Platinum thermometer, bench',
    serial: '19-0925',
    expandedUncertainty: 0.03,
    uncertaintyUnit: 'C',
    correction: 0,
    issuedDaysAgo: 382,
    dueInDays: -17,
  },
  {
    code: 'CM-02',
    kind: 'meter',
    name: 'Portable conductivity meter',
    serial: 'PM-3305',
    expandedUncertainty: 0.5,
    uncertaintyUnit: 'percent',
    correction: 0,
    issuedDaysAgo: 96,
    dueInDays: 269,
  },
  {
    code: 'CM-03',
    kind: 'meter',
    name: 'Portable conductivity meter',
    serial: 'PM-3306',
    expandedUncertainty: 0.5,
    uncertaintyUnit: 'percent',
    correction: 0.1,
    issuedDaysAgo: 96,
    dueInDays: 269,
  },
  {
    code: 'RC-01',
    kind: 'cell',
    name: 'Flow cell, K 0.1 per cm',
    serial: 'FC-0118',
    expandedUncertainty: 1,
    uncertaintyUnit: 'percent',
    correction: 0,
    issuedDaysAgo: 201,
    dueInDays: 164,
  },
  {
    code: 'RS-01',
    kind: 'resistor-set',
    name: 'Resistors, 100 to 100 000 ohm',
    serial: 'RD-077',
    expandedUncertainty: 0.1,
    uncertaintyUnit: 'percent',
    correction: 0,
    issuedDaysAgo: 310,
    dueInDays: 420,
  },
  {
    code: 'BAL-01',
    kind: 'balance',
    name: 'Analytical balance, 220 g',
    serial: 'AB-5521',
    expandedUncertainty: 0.0004,
    uncertaintyUnit: 'g',
    correction: 0,
    issuedDaysAgo: 88,
    dueInDays: 277,
  },
  {
    code: 'BAL-02',
    kind: 'balance',
    name: 'Precision balance, 6 kg',
    serial: 'PB-1180',
    expandedUncertainty: 0.04,
    uncertaintyUnit: 'g',
    correction: 0,
    issuedDaysAgo: 88,
    dueInDays: 277,
  },
];

const laboratory = 'Tarn Hollow Calibration';

/** Reference instruments with their certificates, as a manager registered them. */
export async function loadInstruments(loading: Loading): Promise<void> {
  const { endAt } = loading.history;
  for (const [index, { issuedDaysAgo, dueInDays, ...seed }] of seeds.entries()) {
    const at = endAt - (issuedDaysAgo - 3) * dayMs;
    const facts = {
      ...seed,
      certificateNumber: `TH-${5200 + index * 7}`,
      issuedOn: dayOf(endAt - issuedDaysAgo * dayMs),
      dueOn: dayOf(endAt + dueInDays * dayMs),
      coverageFactor: 2,
      traceability: `${laboratory}, measured against its own standards that realise the SI.`,
    };
    const certificateId = await storeCertificate(loading, {
      fileName: `${seed.code}-certificate.pdf`,
      lines: [
        laboratory,
        `Certificate ${facts.certificateNumber}`,
        `${seed.name}, serial ${seed.serial}`,
        `Expanded uncertainty: ${seed.expandedUncertainty} ${seed.uncertaintyUnit}, k = 2. Correction: ${seed.correction}`,
        `Issued ${facts.issuedOn}.`,
        'An invented certificate of an invented laboratory, for the demonstration.',
      ],
      at,
    });
    const row = await Instrument.create({ ...facts, certificateId, createdAt: new Date(at) });
    loading.trail.push({
      action: 'instruments.created',
      objectKind: 'instruments',
      objectId: row.id,
      objectVersion: 0,
      siteId: null,
      newValue: facts,
      at,
      by: 'tomas',
    });
  }
}

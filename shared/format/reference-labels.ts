/** Words for reference instruments and for the steps and numbers of a procedure. */
import type { UncertaintyUnit } from '../contracts/instruments.ts';
import type { Criteria } from '../contracts/procedures.ts';
import type { InstrumentKind, InstrumentState, RunStep } from '../contracts/vocabulary.ts';

export const INSTRUMENT_KIND_LABELS: Readonly<Record<InstrumentKind, string>> = {
  meter: 'conductivity meter',
  thermometer: 'thermometer',
  cell: 'reference cell',
  'resistor-set': 'resistor set',
  balance: 'balance',
};

export const INSTRUMENT_STATE_LABELS: Readonly<Record<InstrumentState, string>> = {
  'in-use': 'in use',
  'out-of-use': 'out of use',
};

/** Units as printed; the wire spells them in ASCII. */
export const UNCERTAINTY_UNIT_LABELS: Readonly<Record<UncertaintyUnit, string>> = {
  C: '°C',
  percent: '%',
  'uS/cm': 'µS/cm',
  ohm: 'Ω',
  g: 'g',
};

/** A step as a procedure lists it, with what it is for. */
export const PROCEDURE_STEPS: Readonly<Record<RunStep, { label: string; purpose: string }>> = {
  identify: { label: 'Identify the probe', purpose: 'serial number and settings against the record' },
  'pre-checks': { label: 'Pre-checks and cautions', purpose: 'hazards, permit, control room' },
  hold: { label: 'Hold the point', purpose: 'nobody acts on a reading from a beaker' },
  'as-found-process': {
    label: 'As found, in the process',
    purpose: 'untouched, beside a portable reference',
  },
  'as-found': { label: 'As found, uncleaned', purpose: 'in solution, before anything is changed' },
  clean: { label: 'Clean', purpose: 'least aggressive first' },
  'zero-in-air': { label: 'Zero in air', purpose: 'dry, no bubbles' },
  'as-found-cleaned': { label: 'As found, cleaned', purpose: 'what cleaning changed, and what is drift' },
  decide: { label: 'Adjust or leave', purpose: 'only when the change is significant' },
  'second-point': { label: 'Second point', purpose: 'an independent lot, nothing adjusted' },
  'temperature-sensor': { label: 'Temperature sensor', purpose: 'against the reference thermometer' },
  'as-left': { label: 'As left', purpose: 'the first solution again, a fresh part of it' },
  reinstall: { label: 'Reinstall', purpose: 'release the hold, let it settle' },
  review: { label: 'Review', purpose: 'everything on one page' },
  sign: { label: 'Sign', purpose: 'password and meaning' },
};

/** The numbers a run is held to; a share is kept as a part of one and shown as such. */
export const CRITERIA_LABELS: Readonly<
  Record<keyof Criteria, { label: string; unit: string; hint: string }>
> = {
  minReplicates: {
    label: 'Readings of each state, at least',
    unit: '',
    hint: 'Three at least; five when the solution allows.',
  },
  stabilityWindowS: {
    label: 'Window of the settling display',
    unit: 's',
    hint: 'Slope and range are taken over it.',
  },
  stabilityRangePercent: {
    label: 'Range within the window',
    unit: '%',
    hint: 'Largest less smallest, of the mean.',
  },
  stabilitySlopePercentPerMin: { label: 'Slope within the window', unit: '%/min', hint: 'Up or down.' },
  temperatureRangeC: { label: 'Range of temperature', unit: '°C', hint: '0.1 °C is 0.2 % of a KCl value.' },
  stabilityTimeoutS: {
    label: 'Time-out',
    unit: 's',
    hint: '“Not stable” is then the result. A large body needs 10 to 30 minutes.',
  },
  repeatabilityLimitPercent: {
    label: 'Repeatability limit',
    unit: '%',
    hint: 'Standard deviation of the readings of one state.',
  },
  adjustmentShareOfTolerance: {
    label: 'Adjust above this part of the tolerance',
    unit: '',
    hint: 'Two thirds is 0.6667. Adjusting below it would follow the noise.',
  },
  openBeakerLimitUsCm: {
    label: 'No open beaker below',
    unit: 'µS/cm',
    hint: 'Carbon dioxide of the air adds up to 1.1 µS/cm.',
  },
};

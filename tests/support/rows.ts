/** Rows with believable defaults; a test names only what matters to it. */
import {
  Area,
  Assignment,
  Bottle,
  CellConstant,
  Check,
  Device,
  DeviceBoot,
  Instrument,
  LiveReading,
  Point,
  Probe,
  Reading,
  Site,
  Standard,
} from '../../server/db/models/index.ts';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';

let count = 0;
const next = (): number => (count += 1);

export const aSite = (more: Partial<Site> = {}): Promise<Site> => {
  const n = next();
  return Site.create({
    code: `S${n}`,
    name: `Site ${n}`,
    timeZone: 'Europe/London',
    retiredAt: null,
    ...more,
  });
};

export const anArea = (siteId: number, more: Partial<Area> = {}): Promise<Area> =>
  Area.create({ siteId, name: `Area ${next()}`, ...more });

/** Requirements of a rinse-water point, as a request body and as a row. */
export const requirements = {
  name: 'Rinse return',
  duty: 'ends the rinse',
  medium: 'rinse water',
  displayUnit: 'uS/cm',
  compensationModel: 'linear',
  compensationCoefficientPercentPerK: 2,
  referenceTemperatureC: 25,
  lowLimitUsCm: null,
  highLimitUsCm: 2000,
  tolerancePercent: 3,
  decisionRule: 'guarded-u',
  intervalDays: 90,
  intervalMethod: 'fixed',
  criticality: 'high',
  hazardTags: ['chemicals'],
  controlNote: null,
} satisfies Partial<Point>;

export const aPoint = async (siteId: number, more: Partial<Point> = {}): Promise<Point> => {
  const areaId = more.areaId ?? (await anArea(siteId)).id;
  return Point.create({ ...requirements, code: `P-${next()}`, retiredAt: null, areaId, ...more });
};

export const nameplate = {
  kind: 'four-electrode',
  nominalCellConstantPerCm: 1,
  rangeLowUsCm: 0,
  rangeHighUsCm: 20_000,
  resolutionUsCm: 0.1,
  temperatureSensor: 'pt1000',
  deviceCompensation: 'none',
} satisfies Partial<Probe>;

export const aProbe = async (siteId: number, more: Partial<Probe> = {}): Promise<Probe> => {
  const n = next();
  const probe = await Probe.create({
    ...nameplate,
    serial: `SN-${n}`,
    tag: `probe-${n}`,
    cellConstantPerCm: 1,
    notes: '',
    status: 'spare',
    retiredAt: null,
    retiredReason: null,
    siteId,
    ...more,
  });
  await CellConstant.create({
    probeId: probe.id,
    cellConstantPerCm: probe.cellConstantPerCm,
    fromAt: new Date('2026-01-01T00:00:00Z'),
    origin: 'registered',
    reason: null,
    userId: null,
  });
  return probe;
};

/** Stands the probe at the point since a day of spring. */
export const installed = async (
  probe: Probe,
  point: Point,
  installedBy: number,
  more: Partial<Assignment> = {},
): Promise<Assignment> => {
  await Probe.update({ status: 'in-service' }, { where: { id: probe.id } });
  const fromAt = new Date('2026-03-01T08:00:00Z');
  const stand = { probeId: probe.id, pointId: point.id, fromAt, toAt: null, installedBy, removedBy: null };
  return Assignment.create({ ...stand, ...more });
};

export const aDevice = (probeId: number, more: Partial<Device> = {}): Promise<Device> =>
  Device.create({
    name: `device-${next()}`,
    secretHash: hashDeviceSecret('known-only-to-tests'),
    firmware: '1.0.0',
    settingsHash: 'sha256:0000',
    reportedCellConstantPerCm: 1,
    readingIntervalS: 10,
    clockOffsetMs: 0,
    clockSource: 'ntp',
    isOnline: true,
    onlineWhy: 'start',
    bootText: '01JE6M0T6Y',
    stateAt: null,
    lastSeenAt: new Date('2026-12-01T11:59:55Z'),
    credentialsIssuedAt: new Date('2026-03-01T08:00:00Z'),
    revokedAt: null,
    probeId,
    ...more,
  });

/** The newest reading of a probe: 1000 µS/cm at 25 °C, five seconds before noon. */
export const aLiveReading = (
  probeId: number,
  deviceId: number,
  more: Partial<LiveReading> = {},
): Promise<LiveReading> =>
  LiveReading.create({
    probeId,
    deviceId,
    boot: '01JE6M0T6Y',
    n: 1,
    context: 'process',
    conductivityUsCm: 1000,
    temperatureC: 25,
    quality: 'good',
    flags: [],
    solution: null,
    at: new Date('2026-12-01T11:59:55Z'),
    receivedAt: new Date('2026-12-01T11:59:55.200Z'),
    ...more,
  });

/** Readings of one boot, numbered in the order given. */
export async function someReadings(
  probeId: number,
  deviceId: number,
  readings: readonly (Partial<Reading> & { at: Date })[],
): Promise<void> {
  const [boot] = await DeviceBoot.findOrCreate({ where: { deviceId, boot: `B${deviceId}X` } });
  const first = next() * 1_000_000;
  await Reading.bulkCreate(
    readings.map((reading, index) => ({
      deviceId,
      bootId: boot.id,
      n: first + index,
      context: 'process' as const,
      conductivityUsCm: 1000,
      temperatureC: 25,
      conductanceUs: null,
      solution: null,
      quality: 'good' as const,
      flags: null,
      extra: null,
      receivedAt: reading.at,
      probeId,
      settingsId: null,
      ...reading,
    })),
  );
}

/** A released lot of 0.01 mol/kg KCl that is good for another year. */
export const aStandard = (more: Partial<Standard> = {}): Promise<Standard> =>
  Standard.create({
    code: `LOT-${next()}`,
    producer: 'Bench',
    product: 'KCl 0.01 mol/kg',
    medium: 'kcl-aqueous',
    basis: 'molal',
    nominal: 0.01,
    certifiedConductivityUsCm: null,
    expandedUncertaintyUsCm: null,
    coverageFactor: null,
    temperatureTable: null,
    issuedOn: '2026-01-01',
    expiresOn: '2027-12-31',
    state: 'released',
    stateReason: 'Certificate read.',
    stateChangedAt: new Date('2026-01-02T09:00:00Z'),
    ...more,
  });

/** A comparison that counts: +0.5 % ± 0.4 % against 3 %, within and clear. */
export const aCheck = (
  where: { probeId: number; pointId: number | null; standardId: number },
  more: Partial<Check> = {},
): Promise<Check> =>
  Check.create({
    stage: 'automatic',
    n: null,
    deviceId: null,
    bootId: null,
    solution: 'LOT',
    isValid: true,
    invalidReason: null,
    conductivityUsCm: 1415.27,
    temperatureC: 25,
    cellConstantPerCm: 1,
    referenceUsCm: 1408.23,
    errorPercent: 0.5,
    impliedCellConstantPerCm: 0.995,
    expandedUncertaintyPercent: 0.4,
    coverageFactor: 2,
    tolerancePercent: 3,
    decisionRule: 'guarded-u',
    outcome: 'within-clear',
    probabilityOutside: 0,
    acceptanceLimitPercent: 2.6,
    budget: null,
    referenceSource: 'pratt-2001',
    at: new Date('2026-11-20T09:00:00Z'),
    performedByUserId: null,
    ...where,
    ...more,
  });

/** A thermometer in use, due in half a year: U 0.05 °C. */
export const anInstrument = (more: Partial<Instrument> = {}): Promise<Instrument> => {
  const n = next();
  return Instrument.create({
    code: `RT-${n}`,
    kind: 'thermometer',
    name: 'Reference thermometer',
    serial: `TH-${n}`,
    certificateNumber: `C-${n}`,
    issuedOn: '2026-06-01',
    dueOn: '2027-06-01',
    expandedUncertainty: 0.05,
    uncertaintyUnit: 'C',
    coverageFactor: 2,
    certificateId: null,
    ...more,
  });
};

/** A full, unopened bottle of the lot. */
export const aBottle = (standardId: number, more: Partial<Bottle> = {}): Promise<Bottle> =>
  Bottle.create({
    code: `BOTTLE/${next()}`,
    standardId,
    siteId: null,
    volumeMl: 500,
    remainingMl: 500,
    openedAt: null,
    openedBy: null,
    useByOn: null,
    discardedAt: null,
    discardedReason: null,
    ...more,
  });

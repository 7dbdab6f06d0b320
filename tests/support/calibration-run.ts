/** A calibration as a technician makes it over HTTP: everything on the bench, and each step with believable readings. */
import { randomUUID } from 'node:crypto';
import type { Agent, Response } from 'supertest';
import {
  Bottle,
  Instrument,
  type Device,
  type Point,
  type Probe,
  type Site,
  type Standard,
} from '../../server/db/models/index.ts';
import type { Calibration } from '../../shared/contracts/calibrations.ts';
import type { CaptureStep, RunStep } from '../../shared/contracts/vocabulary.ts';
import { lotReferenceConductivity, type CertifiedLot } from '../../shared/science/certified-lots.ts';
import { testNow, testPassword, type Somebody, type TestApp } from './app.ts';
import { aDevice, aPoint, aProbe, aSite, aStandard, installed } from './rows.ts';

export interface Bench {
  site: Site;
  point: Point;
  probe: Probe;
  device: Device;
  lot: Standard;
  secondLot: Standard;
  bottle: Bottle;
  thermometer: Instrument;
}

let count = 0;

export const aThermometer = (more: Partial<Instrument> = {}): Promise<Instrument> =>
  Instrument.create({
    code: `RT-${(count += 1)}`,
    kind: 'thermometer',
    name: 'Reference thermometer',
    serial: `T-${count}`,
    certificateNumber: '7741-B',
    issuedOn: '2026-05-12',
    dueOn: '2027-05-12',
    expandedUncertainty: 0.03,
    uncertaintyUnit: 'C',
    coverageFactor: 2,
    ...more,
  });

export const aBottle = (lot: Standard, siteId: number, more: Partial<Bottle> = {}): Promise<Bottle> =>
  Bottle.create({
    code: `${lot.code}/${(count += 1)}`,
    volumeMl: 500,
    remainingMl: 500,
    standardId: lot.id,
    siteId,
    ...more,
  });

/** An installed probe with its device, two certified lots, a bottle and a thermometer. */
export async function aBench(
  app: TestApp,
  more: { site?: Partial<Site>; point?: Partial<Point>; probe?: Partial<Probe> } = {},
): Promise<Bench> {
  const site = await aSite(more.site);
  const point = await aPoint(site.id, { tolerancePercent: 2, ...more.point });
  const probe = await aProbe(site.id, more.probe);
  await installed(probe, point, (await app.person('administrator')).id);
  const device = await aDevice(probe.id, { reportedCellConstantPerCm: probe.cellConstantPerCm });
  const certified = { expandedUncertaintyUsCm: 3.5, coverageFactor: 2, openedLifeDays: 30 };
  const lot = await aStandard({ ...certified, certifiedConductivityUsCm: 1408.2 });
  const secondLot = await aStandard({
    ...certified,
    product: 'KCl 0.1 mol/kg',
    nominal: 0.1,
    certifiedConductivityUsCm: 12_824,
    expandedUncertaintyUsCm: 32,
  });
  const bottle = await aBottle(lot, site.id);
  return { site, point, probe, device, lot, secondLot, bottle, thermometer: await aThermometer() };
}

export const startBody = (bench: Bench, more: object = {}) => ({
  key: randomUUID(),
  probeId: bench.probe.id,
  standardId: bench.lot.id,
  bottleId: bench.bottle.id,
  secondStandardId: bench.secondLot.id,
  thermometerId: bench.thermometer.id,
  capturedAt: testNow,
  ...more,
});

const minutesLater = (minutes: number): string =>
  new Date(new Date(testNow).getTime() + minutes * 60_000).toISOString();

export const stepBody = (data: Record<string, unknown> & { step: RunStep }, more: object = {}) => ({
  key: randomUUID(),
  capturedAt: minutesLater(1),
  data,
  ...more,
});

export const captureBody = (step: CaptureStep, more: object = {}) => ({
  key: randomUUID(),
  step,
  source: 'typed',
  conductivityUsCm: 1408.2,
  temperatureC: 25,
  referenceTemperatureC: 25,
  isStable: true,
  capturedAt: minutesLater(1),
  ...more,
});

const asLot = (lot: Standard): CertifiedLot => ({
  medium: lot.medium,
  basis: lot.basis,
  nominal: lot.nominal as CertifiedLot['nominal'],
  certifiedConductivityUsCm: lot.certifiedConductivityUsCm,
  referenceTemperatureC: lot.referenceTemperatureC ?? 25,
  expandedUncertaintyUsCm: lot.expandedUncertaintyUsCm,
  coverageFactor: lot.coverageFactor,
  temperatureTable: null,
});

/** What a probe with that error shows in the lot. */
export const shownIn = (lot: Standard, errorPercent: number, temperatureC = 25): number =>
  lotReferenceConductivity({ lot: asLot(lot), temperatureC }).conductivityUsCm * (1 + errorPercent / 100);

export interface StoryOptions {
  bench: Bench;
  errors: { asFound: number; cleaned: number };
  decision: 'leave' | 'adjust';
  reason?: string | null;
  /** When the visit is made; the test's own now unless given. */
  at?: string;
}

/** Replicates that scatter by a few hundredths of a percent. */
const scatterPercent = [0, 0.02, -0.02];

/** Walks through a run; `until` names the step it stops before. */
export class RunStory {
  id = 0;
  last!: Calibration;
  private readonly agent: Agent;
  readonly options: StoryOptions;

  constructor(agent: Agent, options: StoryOptions) {
    this.agent = agent;
    this.options = options;
  }

  async send(path: string, body: object, status = 200): Promise<Calibration> {
    const answer = await this.ask(path, body);
    if (answer.status !== status)
      throw new Error(`${path} was answered ${answer.status}: ${JSON.stringify(answer.body)}`);
    this.last = answer.body as Calibration;
    return this.last;
  }

  ask(path: string, body: object): Promise<Response> {
    return this.agent.post(`/api/calibrations/${this.id}/${path}`).send(body) as unknown as Promise<Response>;
  }

  private minute(minutes: number): string {
    return new Date(new Date(this.options.at ?? testNow).getTime() + minutes * 60_000).toISOString();
  }

  capture(step: CaptureStep, more: object = {}): Promise<Calibration> {
    return this.send('captures', captureBody(step, { capturedAt: this.minute(1), ...more }));
  }

  finish(data: Record<string, unknown> & { step: RunStep }): Promise<Calibration> {
    return this.send('steps', stepBody(data, { capturedAt: this.minute(1) }));
  }

  async start(more: object = {}): Promise<Calibration> {
    const body = startBody(this.options.bench, { capturedAt: this.minute(0), ...more });
    const answer = await this.agent.post('/api/calibrations').send(body);
    if (answer.status !== 201) throw new Error(`Not started: ${JSON.stringify(answer.body)}`);
    this.last = answer.body as Calibration;
    this.id = this.last.id;
    return this.last;
  }

  async captureReplicates(step: CaptureStep, lot: Standard, errorPercent: number): Promise<void> {
    for (const scatter of scatterPercent)
      await this.capture(step, { conductivityUsCm: shownIn(lot, errorPercent + scatter) });
  }

  /** Does one step the way it should be done. */
  async doStep(step: RunStep): Promise<void> {
    const { bench, errors, decision, reason = null } = this.options;
    switch (step) {
      case 'identify':
        await this.finish({ step, by: 'scan', serial: bench.probe.serial });
        return;
      case 'pre-checks':
        await this.finish({ step, permitNumber: 'W-1187', cautionsRead: true, controlRoomTold: true });
        return;
      case 'hold':
        await this.finish({ step, untilAt: this.minute(120) });
        return;
      case 'as-found-process':
        await this.capture(step, { conductivityUsCm: 1071, temperatureC: 13 });
        await this.finish({ step, comparedWith: 'nothing' });
        return;
      case 'as-found':
        await this.captureReplicates(step, bench.lot, errors.asFound);
        break;
      case 'clean':
        await this.finish({ step, agent: 'citric acid 5 %', minutes: 5 });
        return;
      case 'zero-in-air':
        await this.capture(step, { conductivityUsCm: 0.2 });
        break;
      case 'as-found-cleaned':
        await this.captureReplicates(step, bench.lot, errors.cleaned);
        break;
      case 'decide':
        await this.finish({ step, decision, reason });
        return;
      case 'second-point':
        await this.captureReplicates(step, bench.secondLot, errors.cleaned);
        break;
      case 'temperature-sensor':
        await this.capture(step, { temperatureC: 25.04, referenceTemperatureC: 25 });
        break;
      case 'as-left':
        await this.captureReplicates(step, bench.lot, errors.cleaned);
        break;
      default:
    }
    await this.finish({ step });
  }

  /** Starts when it has not begun, then does steps until `until` is the current one. */
  async goTo(until: RunStep, start: object = {}): Promise<Calibration> {
    if (this.id === 0) await this.start(start);
    while (this.last.currentStep !== null && this.last.currentStep !== until)
      await this.doStep(this.last.currentStep);
    return this.last;
  }

  async sign(password = testPassword): Promise<Calibration> {
    await this.goTo('sign');
    return this.send('sign', { password, capturedAt: this.minute(9) });
  }
}

export async function aRun(
  app: TestApp,
  options: StoryOptions,
  who: Somebody = 'technician',
): Promise<RunStory> {
  return new RunStory(await app.as(who), options);
}

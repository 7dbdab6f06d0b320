/** Many devices in one process: one ticker, staggered connections, deeds on request. */
import type { ReferenceSolution } from './bench.ts';
import { SimulatedDevice } from './device.ts';
import { faultKinds, floodFactor, type FaultKind } from './faults.ts';
import { genericProbe } from './generic-profile.ts';
import { Publisher, type PublisherCounts } from './publisher.ts';
import { seedFor, uniformAt } from './random.ts';
import type { FleetDevice, FleetFile } from './scenario/fleet-file.ts';
import { processWater } from './scenario/process-waters.ts';
import { StateStore } from './state-store.ts';
import { Ticker } from './ticker.ts';

const SAVE_EVERY_MS = 60_000;
/** A broker that goes away troubles every device at once: said in one line. */
const REPORT_EVERY_MS = 2000;
/** New connections a second: a broker hashing passwords needs time for each. */
const CONNECTS_PER_SECOND = 40;
const DEFAULT_SOLUTION_C = 22;

export interface FleetOptions {
  file: FleetFile;
  url: string;
  /** Number of devices; all of the file when undefined. */
  probes?: number;
  /** Readings a second per probe; each profile's own interval when undefined. */
  rate?: number;
  /** How many times faster than the clock the physical world runs. */
  speed: number;
  seed: number;
  statePath: string | null;
  isMarked: boolean;
  report: (line: string) => void;
  wall?: () => number;
}

/** What can be asked of a running fleet. `device` may be the device name, the serial number or part of either. */
export type Deed =
  | { do: 'list' }
  | { do: 'fault'; device: string; fault: FaultKind; minutes: number }
  | { do: 'heal'; device: string }
  | {
      do: 'bench';
      device: string;
      solution: ReferenceSolution | string;
      temperatureC?: number;
      context: 'check' | 'calibration';
    }
  | { do: 'air'; device: string }
  | { do: 'check'; device: string; solution?: string }
  | { do: 'clean'; device: string }
  | { do: 'process'; device: string }
  | { do: 'cell-constant'; device: string; perCm: number };

interface Member {
  publisher: Publisher;
  origin: number;
  readingEntry: number;
  everyMs: number;
}

export class Fleet {
  readonly counts: PublisherCounts = { readingsAcknowledged: 0, messagesAcknowledged: 0, connections: 0 };
  readonly ticker: Ticker;
  private readonly members: Member[] = [];
  private readonly troubles = new Map<string, string[]>();
  private readonly options: FleetOptions;
  private readonly store: StateStore;
  private readonly solutions: Map<string, ReferenceSolution>;
  private readonly wall: () => number;

  constructor(options: FleetOptions) {
    this.options = options;
    this.wall = options.wall ?? Date.now;
    this.ticker = new Ticker(this.wall);
    this.store = new StateStore(options.statePath);
    this.solutions = new Map((options.file.solutions ?? []).map((solution) => [solution.code, solution]));
    const { devices } = options.file;
    const wanted = options.probes ?? devices.length;
    if (wanted > devices.length) {
      throw new Error(
        `${wanted} probes were asked for, but the credentials file names ${devices.length} devices. Issue credentials for more, or ask for fewer.`,
      );
    }
    const startedAt = this.wall();
    for (const entry of devices.slice(0, wanted)) this.members.push(this.member(entry, startedAt));
  }

  private member(entry: FleetDevice, startedAt: number): Member {
    const { seed, speed, rate } = this.options;
    const generic = genericProbe(entry.device, seed, startedAt);
    const profile = { ...(entry.profile ?? generic.profile), device: entry.device };
    const given = entry.state ?? generic.state;
    const state = this.store.startState(entry.device, given);
    // After a run at speed the probe is older than the clock: its world goes on from there.
    const worldStart = Math.max(startedAt, state.at);
    const everyMs = Math.max(1, Math.round(rate ? 1000 / rate : profile.intervalS * 1000));
    const device = new SimulatedDevice({
      profile,
      water: processWater(profile.water),
      state,
      seed,
      intervalS: everyMs / 1000,
      startedAt,
      solutions: this.solutions,
      physicsAt: (wall) => worldStart + (wall - startedAt) * speed,
      isMarked: this.options.isMarked,
    });
    const publisher = new Publisher({
      device,
      secret: entry.secret,
      url: this.options.url,
      seed,
      ticker: this.ticker,
      wall: this.wall,
      report: (device, trouble) => this.noteTrouble(device, trouble),
      counts: this.counts,
      onLastingChange: () => this.save(),
    });
    return { publisher, origin: given.at, readingEntry: 0, everyMs };
  }

  start(): void {
    this.members.forEach((member, index) => {
      this.ticker.once(1 + Math.floor((index * 1000) / CONNECTS_PER_SECOND), () =>
        member.publisher.connect(),
      );
      this.schedule(member, 1);
    });
    this.ticker.every(SAVE_EVERY_MS, () => this.save());
    this.ticker.every(REPORT_EVERY_MS, () => this.reportTroubles());
    this.ticker.start();
  }

  private noteTrouble(device: string, trouble: string): void {
    const devices = this.troubles.get(trouble);
    if (devices) devices.push(device);
    else this.troubles.set(trouble, [device]);
  }

  private reportTroubles(): void {
    for (const [trouble, devices] of this.troubles) {
      const others = devices.length > 1 ? ` and ${devices.length - 1} more` : '';
      this.options.report(`${devices[0]}${others}: ${trouble}`);
    }
    this.troubles.clear();
  }

  /** Puts the probe's readings on the ticker, spread over its interval so that the fleet does not speak in chorus. */
  private schedule(member: Member, factor: number): void {
    this.ticker.cancel(member.readingEntry);
    const everyMs = Math.max(1, member.everyMs / factor);
    const offset = uniformAt(seedFor(this.options.seed, member.publisher.device.name), 0x0ff5) * everyMs;
    const perTick = Math.max(1, Math.round(25 / everyMs));
    member.readingEntry = this.ticker.every(
      Math.max(everyMs, 25),
      (now) => {
        // Quicker than the ticker: several readings a tick, each with its own time.
        for (let index = 0; index < perTick; index += 1)
          member.publisher.takeReading(Math.round(now - (perTick - 1 - index) * everyMs));
      },
      offset,
    );
  }

  save(): void {
    this.store.save(
      this.members.map(({ publisher, origin }) => ({
        device: publisher.device.name,
        origin,
        state: publisher.device.state,
      })),
    );
  }

  async stop(): Promise<void> {
    this.save();
    this.ticker.stop();
    await Promise.all(this.members.map(({ publisher }) => publisher.stop()));
  }

  get connected(): number {
    return this.members.filter(({ publisher }) => publisher.isConnected).length;
  }

  get size(): number {
    return this.members.length;
  }

  /** Does what was asked and says it in one sentence. */
  perform(deed: Deed): string {
    if (deed.do === 'list') return this.list();
    const member = this.find(deed.device);
    const { publisher } = member;
    const { device } = publisher;
    const now = this.wall();
    switch (deed.do) {
      case 'fault':
        return this.startFault(member, deed.fault, deed.minutes);
      case 'heal':
        for (const fault of [...device.faults]) this.endFault(member, fault);
        return `${device.name} works again.`;
      case 'bench': {
        const solution = typeof deed.solution === 'string' ? this.solution(deed.solution) : deed.solution;
        const temperatureC = deed.temperatureC ?? DEFAULT_SOLUTION_C;
        device.immerse({ solution, temperatureC }, deed.context, now);
        publisher.announce('context', `Put into ${solution.code}.`);
        return `${device.name} is in ${solution.code} at ${temperatureC} °C, context ${deed.context}, and settles.`;
      }
      case 'air':
        device.holdInAir('calibration');
        publisher.announce('context', 'Held dry in air.');
        return `${device.name} is held dry in air.`;
      case 'check': {
        const solution = this.solution(deed.solution ?? device.profile.check?.solution ?? '');
        device.startCheck(solution);
        return `${device.name} flushes its flow cell with ${solution.code} and checks in three readings.`;
      }
      case 'clean':
        device.clean();
        this.save();
        return `The deposit on ${device.name} is gone.`;
      case 'process':
        device.backToProcess();
        publisher.announce('context', 'Back in the process.');
        return `${device.name} is back in its process water.`;
      case 'cell-constant':
        device.setCellConstant(deed.perCm);
        publisher.announceSettings('Cell constant changed at the device.');
        return `${device.name} now uses ${device.state.cellConstantInUsePerCm} cm⁻¹, and no record asked for it.`;
    }
  }

  private startFault(member: Member, fault: FaultKind, minutes: number): string {
    const { publisher } = member;
    publisher.device.faults.add(fault);
    if (fault === 'offline') publisher.cutOff();
    if (fault === 'flood') this.schedule(member, floodFactor);
    this.ticker.once(minutes * 60_000, () => this.endFault(member, fault));
    return `${publisher.device.name}: ${faultKinds[fault]}, for ${minutes} min.`;
  }

  private endFault(member: Member, fault: FaultKind): void {
    if (!member.publisher.device.faults.delete(fault)) return;
    if (fault === 'offline') member.publisher.comeBack();
    if (fault === 'flood') this.schedule(member, 1);
  }

  private solution(code: string): ReferenceSolution {
    const solution = this.solutions.get(code);
    if (!solution) {
      const known = [...this.solutions.keys()].join(', ') || 'none';
      throw new Error(
        `No solution "${code}". Known lots: ${known}. For another one give --basis and --nominal.`,
      );
    }
    return solution;
  }

  private find(text: string): Member {
    const wanted = text.toLowerCase();
    const names = (member: Member) => [
      member.publisher.device.name,
      member.publisher.device.profile.serial.toLowerCase(),
    ];
    const exact = this.members.find((member) => names(member).includes(wanted));
    const partly = this.members.filter((member) => names(member).some((name) => name.includes(wanted)));
    const found = exact ?? (partly.length === 1 ? partly[0] : undefined);
    if (found) return found;
    if (partly.length > 1)
      throw new Error(
        `"${text}" fits ${partly.length} devices: ${partly
          .slice(0, 8)
          .map((one) => one.publisher.device.name)
          .join(', ')}. Say which.`,
      );
    throw new Error(`No device "${text}" in this fleet. "list" names them all.`);
  }

  private list(): string {
    return this.members
      .map(({ publisher }) => {
        const { device } = publisher;
        const faults = [...device.faults].join(', ');
        return [
          device.name,
          device.profile.serial,
          device.profile.water,
          publisher.isConnected ? 'connected' : 'not connected',
          faults,
        ]
          .filter(Boolean)
          .join('  ');
      })
      .join('\n');
  }
}

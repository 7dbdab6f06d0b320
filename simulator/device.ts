/**
 * The transmitter: takes readings from the physical probe, numbers and keeps them, answers commands. It knows no
 * network; publisher.ts carries what it says.
 */
import {
  maxReadingsPerMessage,
  payloadVersion,
  type BirthMessage,
  type CommandMessage,
  type EventMessage,
  type MqttReading,
  type ReadingsMessage,
  type ReplyMessage,
  type StateMessage,
} from '../shared/contracts/mqtt.ts';
import type { ReadingContext, ReadingFlag } from '../shared/contracts/vocabulary.ts';
import { benchSurroundings, settledSurroundings, type Immersion, type ReferenceSolution } from './bench.ts';
import { bootIdAt } from './boot.ts';
import { clockErrorMs, distort, type FaultKind } from './faults.ts';
import {
  advanceProbe,
  cleanProbe,
  observe,
  roundCellConstant,
  type ProbeProfile,
  type ProbeState,
  type Surroundings,
} from './probe.ts';
import { seedFor, uniformAt } from './random.ts';
import { settingsHashOf, settingsOf } from './settings.ts';
import { flowOf } from './waters.ts';
import type { Water } from './waters.ts';

const HOUR_MS = 3_600_000;
/** Readings kept for "resend"; at one every five seconds this is five hours. */
const KEPT_READINGS = 3600;
/** Commands may be delivered twice (QoS 1): the last answers are remembered, so that nothing is done twice. */
const REMEMBERED_COMMANDS = 32;
/** A transmitter refuses a cell constant that no probe of its build can have. */
const SANE_CHANGE = 0.5;
/** The flow cell is flushed for two readings before it checks and for one after. */
const CHECK_STEPS: readonly ReadingContext[] = ['maintenance', 'maintenance', 'check', 'maintenance'];

export interface DeviceOptions {
  profile: ProbeProfile;
  water: Water;
  state: ProbeState;
  seed: number;
  intervalS: number;
  startedAt: number;
  solutions: ReadonlyMap<string, ReferenceSolution>;
  /** Wall clock to the time of the physical world, which may run faster. */
  physicsAt: (wall: number) => number;
  /** Marks every reading as simulated, so that it can never pass for a real one. */
  isMarked: boolean;
}

type Place =
  | { kind: 'process' }
  | { kind: 'bench'; immersion: Immersion; context: 'check' | 'calibration' }
  | { kind: 'air'; context: 'maintenance' | 'calibration' };

export class SimulatedDevice {
  readonly profile: ProbeProfile;
  readonly boot: string;
  readonly faults = new Set<FaultKind>();
  private readonly options: DeviceOptions;
  private readonly ownSeed: number;
  private readonly flow: ReturnType<typeof flowOf>;
  private readonly kept: MqttReading[] = [];
  private readonly answered = new Map<string, ReplyMessage>();
  private probeState: ProbeState;
  private place: Place = { kind: 'process' };
  private held: MqttReading | null = null;
  private checkSteps: ReadingContext[] = [];
  private checkSolution: ReferenceSolution | null = null;
  private nextCheckAt: number;

  constructor(options: DeviceOptions) {
    this.options = options;
    this.profile = options.profile;
    this.boot = bootIdAt(options.startedAt);
    this.ownSeed = seedFor(options.seed, options.profile.device);
    this.flow = flowOf(options.water, options.seed);
    this.probeState = options.state;
    // Spread over the hours, so that a fleet does not check all at once.
    const everyMs = (options.profile.check?.everyHours ?? 0) * HOUR_MS;
    const now = options.physicsAt(options.startedAt);
    this.nextCheckAt = now + everyMs * uniformAt(this.ownSeed, 0xc4ec);
  }

  get name(): string {
    return this.profile.device;
  }

  /** What a restart must find again: the physical probe and the settings in the device's flash. */
  get state(): ProbeState {
    return this.probeState;
  }

  get settingsHash(): string {
    return settingsHashOf(this.settings());
  }

  private settings() {
    return settingsOf(this.profile, this.probeState.cellConstantInUsePerCm, this.options.intervalS);
  }

  /** Time as the device believes it to be. */
  clockAt(wall: number): number {
    return wall + (this.faults.has('clock-wrong') ? clockErrorMs : 0);
  }

  private clockReport(): { source: string; offset_ms: number } {
    return { source: 'ntp', offset_ms: Math.round(4 + 20 * uniformAt(this.ownSeed, 0xc10c)) };
  }

  birth(now: number): BirthMessage {
    const { device, serial, kind, firmware } = this.profile;
    return {
      v: payloadVersion,
      boot: this.boot,
      sent: new Date(this.clockAt(now)).toISOString(),
      device,
      serial,
      kind,
      firmware,
      ...this.settings(),
      settings: this.settingsHash,
      clock: this.clockReport(),
    };
  }

  stateMessage(online: boolean, why: StateMessage['why']): StateMessage {
    return { v: payloadVersion, boot: this.boot, online, why };
  }

  event(now: number, kind: EventMessage['kind'], text: string): EventMessage {
    return {
      v: payloadVersion,
      boot: this.boot,
      at: new Date(this.clockAt(now)).toISOString(),
      kind,
      text,
      settings: this.settingsHash,
    };
  }

  /** Packs readings into messages of the size the contract allows. */
  pack(readings: MqttReading[], now: number): ReadingsMessage[] {
    const messages: ReadingsMessage[] = [];
    for (let from = 0; from < readings.length; from += maxReadingsPerMessage) {
      messages.push({
        v: payloadVersion,
        boot: this.boot,
        sent: new Date(this.clockAt(now)).toISOString(),
        clock: this.clockReport(),
        settings: this.settingsHash,
        readings: readings.slice(from, from + maxReadingsPerMessage),
      });
    }
    return messages;
  }

  /** Takes the next reading. */
  read(now: number): MqttReading {
    const physical = this.options.physicsAt(now);
    this.probeState = advanceProbe(this.profile, this.probeState, physical, this.options.seed);
    this.probeState = { ...this.probeState, n: this.probeState.n + 1 };
    const { around, context, solution, extraFlags } = this.surroundings(physical, now);
    const seen = observe(this.profile, this.probeState, around, now, this.ownSeed);
    const reading = distort(
      {
        n: this.probeState.n,
        at: new Date(this.clockAt(now)).toISOString(),
        context,
        conductivity_us_cm: seen.conductivityUsCm,
        temperature_c: seen.temperatureC,
        conductance_us: seen.conductanceUs,
        solution,
        quality: seen.quality,
        flags: [...seen.flags, ...extraFlags, ...(this.options.isMarked ? (['simulated'] as const) : [])],
      },
      this.faults,
      this.held,
      this.ownSeed,
    );
    if (this.faults.has('flat-line')) this.held ??= reading;
    else this.held = null;
    this.kept.push(reading);
    // Dropped in blocks: shifting the array for each reading costs more than the reading.
    if (this.kept.length > KEPT_READINGS * 1.25) this.kept.splice(0, this.kept.length - KEPT_READINGS);
    return reading;
  }

  private surroundings(
    physical: number,
    now: number,
  ): { around: Surroundings; context: ReadingContext; solution: string | null; extraFlags: ReadingFlag[] } {
    const { place } = this;
    if (place.kind === 'bench') {
      const around = benchSurroundings(this.profile, place.immersion, now, this.ownSeed);
      return { around, context: place.context, solution: place.immersion.solution.code, extraFlags: [] };
    }
    if (place.kind === 'air') {
      const around = { conductivityUsCm: 0, temperatureC: 20, inPlace: false };
      return { around, context: place.context, solution: null, extraFlags: ['dry'] };
    }
    const water = this.flow(physical);
    const step = this.nextCheckStep(physical);
    if (step && this.checkSolution) {
      const temperatureC = Math.min(Math.max(18 + (water.temperatureC - 18) / 3, 2), 34);
      const around = settledSurroundings(this.checkSolution, temperatureC, now, this.ownSeed);
      return {
        around,
        context: step,
        solution: step === 'check' ? this.checkSolution.code : null,
        extraFlags: [],
      };
    }
    return { around: { ...water, inPlace: true }, context: 'process', solution: null, extraFlags: [] };
  }

  private nextCheckStep(physical: number): ReadingContext | undefined {
    const { check } = this.profile;
    if (check && this.checkSteps.length === 0 && physical >= this.nextCheckAt) {
      const everyMs = check.everyHours * HOUR_MS;
      this.nextCheckAt += everyMs * (Math.floor((physical - this.nextCheckAt) / everyMs) + 1);
      this.startCheck(this.options.solutions.get(check.solution) ?? null);
    }
    return this.checkSteps.shift();
  }

  /** Lets reference solution into the flow cell for the next few readings. */
  startCheck(solution: ReferenceSolution | null): void {
    this.checkSolution = solution;
    this.checkSteps = solution ? [...CHECK_STEPS] : [];
  }

  immerse(
    immersion: Omit<Immersion, 'startedAt' | 'fromTemperatureC'>,
    context: 'check' | 'calibration',
    now: number,
  ): void {
    const { place } = this;
    const fromTemperatureC =
      place.kind === 'bench'
        ? place.immersion.temperatureC
        : place.kind === 'air'
          ? 20
          : this.flow(this.options.physicsAt(now)).temperatureC;
    this.place = { kind: 'bench', context, immersion: { ...immersion, startedAt: now, fromTemperatureC } };
  }

  holdInAir(context: 'maintenance' | 'calibration'): void {
    this.place = { kind: 'air', context };
  }

  backToProcess(): void {
    this.place = { kind: 'process' };
  }

  clean(): void {
    this.probeState = cleanProbe(this.profile, this.probeState, this.options.seed);
  }

  /** Sets the cell constant in use, as the approved command does, or somebody at the keypad without a record. */
  setCellConstant(perCm: number): void {
    this.probeState = { ...this.probeState, cellConstantInUsePerCm: roundCellConstant(perCm) };
  }

  /** Answers a command. `resend` readings and whether the settings changed tell the publisher what else to send. */
  obey(command: CommandMessage): { reply: ReplyMessage; resend: MqttReading[]; isSettingsChange: boolean } {
    const before = this.answered.get(command.id);
    if (before) return { reply: before, resend: [], isSettingsChange: false };
    const { done, text, resend, isSettingsChange } = this.perform(command);
    const reply: ReplyMessage = { v: payloadVersion, id: command.id, boot: this.boot, done, text };
    this.answered.set(command.id, reply);
    const oldest = this.answered.keys().next();
    if (this.answered.size > REMEMBERED_COMMANDS && !oldest.done) this.answered.delete(oldest.value);
    return { reply, resend, isSettingsChange };
  }

  private perform(command: CommandMessage): {
    done: boolean;
    text: string;
    resend: MqttReading[];
    isSettingsChange: boolean;
  } {
    switch (command.do) {
      case 'birth':
        return { done: true, text: 'Birth published again.', resend: [], isSettingsChange: false };
      case 'resend':
        return { ...this.findKept(command), isSettingsChange: false };
      case 'apply-cell-constant': {
        const inUse = this.probeState.cellConstantInUsePerCm;
        const asked = command.cell_constant_per_cm;
        if (Math.abs(asked / inUse - 1) > SANE_CHANGE) {
          return {
            done: false,
            text: `Refused: ${asked} cm⁻¹ is more than 50 % away from ${inUse} cm⁻¹ in use.`,
            resend: [],
            isSettingsChange: false,
          };
        }
        this.setCellConstant(asked);
        return {
          done: true,
          text: `Cell constant ${inUse} → ${this.probeState.cellConstantInUsePerCm} cm⁻¹.`,
          resend: [],
          isSettingsChange: true,
        };
      }
    }
  }

  private findKept(command: Extract<CommandMessage, { do: 'resend' }>): {
    done: boolean;
    text: string;
    resend: MqttReading[];
  } {
    const { boot, from_n: from, to_n: to } = command;
    if (boot !== this.boot)
      return { done: false, text: `Boot ${boot} is over; its readings are no longer kept.`, resend: [] };
    const resend = this.kept.filter(({ n }) => n >= from && n <= to);
    if (resend.length === 0) return { done: false, text: `No readings ${from} to ${to} are kept.`, resend };
    return { done: true, text: `${resend.length} readings sent again.`, resend };
  }
}

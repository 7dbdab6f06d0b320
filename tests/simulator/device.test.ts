import { beforeEach, describe, expect, it } from 'vitest';
import {
  birthMessage,
  commandMessage,
  eventMessage,
  readingsMessage,
  replyMessage,
  stateMessage,
} from '../../shared/contracts/mqtt.ts';
import { certifiedConductivity, type ReferenceSolution } from '../../simulator/bench.ts';
import { SimulatedDevice, type DeviceOptions } from '../../simulator/device.ts';
import { damage } from '../../simulator/faults.ts';
import { genericProbe } from '../../simulator/generic-profile.ts';
import { processWater } from '../../simulator/scenario/process-waters.ts';

const startedAt = Date.UTC(2026, 11, 1, 13);
const kcl: ReferenceSolution = {
  code: 'KC-26-031',
  basis: 'molal',
  nominal: 0.01,
  certified25UsCm: 1408.2,
  table: null,
  deviation: 0,
};

function makeDevice(more: Partial<DeviceOptions> = {}, profileMore: Partial<DeviceOptions['profile']> = {}) {
  const { profile, state } = genericProbe('probe-2e-1183', 1, startedAt);
  const whole = { ...profile, water: 'after-lime', ...profileMore };
  return new SimulatedDevice({
    profile: whole,
    water: processWater(whole.water),
    state,
    seed: 1,
    intervalS: 5,
    startedAt,
    solutions: new Map([[kcl.code, kcl]]),
    physicsAt: (wall) => wall,
    isMarked: true,
    ...more,
  });
}

describe('a simulated device', () => {
  let device: SimulatedDevice;
  const readMany = (count: number, everyMs = 5000) =>
    Array.from({ length: count }, (_, index) => device.read(startedAt + index * everyMs));

  beforeEach(() => {
    device = makeDevice();
  });

  it('says only what the contract allows', () => {
    const readings = readMany(130);
    const messages = device.pack(readings, startedAt);
    expect(messages.map((one) => one.readings.length)).toEqual([60, 60, 10]);
    for (const message of messages)
      expect(readingsMessage.parse(JSON.parse(JSON.stringify(message)))).toEqual(message);
    expect(birthMessage.safeParse(device.birth(startedAt)).error).toBeUndefined();
    expect(stateMessage.safeParse(device.stateMessage(false, 'lost')).error).toBeUndefined();
    expect(eventMessage.safeParse(device.event(startedAt, 'fault', 'x')).error).toBeUndefined();
  });

  it('numbers its readings without a gap, going on from the number it kept', () => {
    const { state } = genericProbe('probe-2e-1183', 1, startedAt);
    device = makeDevice({ state: { ...state, n: 184_466 } });
    expect(readMany(3).map(({ n }) => n)).toEqual([184_467, 184_468, 184_469]);
  });

  it('is the same device for the same seed and another for another', () => {
    const first = readMany(50);
    device = makeDevice();
    expect(readMany(50)).toEqual(first);
    device = makeDevice({ seed: 2 });
    expect(readMany(50)).not.toEqual(first);
  });

  it('marks what it says as simulated', () => {
    expect(device.read(startedAt).flags).toContain('simulated');
  });

  it('gives a later boot a greater id', () => {
    expect(makeDevice({ startedAt: startedAt + 1 }).boot > device.boot).toBe(true);
  });

  it('sends readings again with the same number and content', () => {
    const readings = readMany(40);
    const command = commandMessage.parse({
      v: 1,
      id: 'c-1',
      do: 'resend',
      boot: device.boot,
      from_n: 5,
      to_n: 9,
    });
    const { reply, resend } = device.obey(command);
    expect(replyMessage.parse(reply)).toMatchObject({ id: 'c-1', done: true });
    expect(resend).toEqual(readings.filter(({ n }) => n >= 5 && n <= 9));
    expect(resend).toHaveLength(5);
  });

  it('refuses to resend what it never had, with a reason', () => {
    readMany(3);
    const { reply, resend } = device.obey({
      v: 1,
      id: 'c-2',
      do: 'resend',
      boot: '00000000',
      from_n: 1,
      to_n: 2,
    });
    expect(resend).toEqual([]);
    expect(reply).toMatchObject({ done: false, text: expect.stringContaining('00000000') });
  });

  it('applies an approved cell constant: other hash, other birth, readings in proportion', () => {
    const before = device.birth(startedAt);
    const reading = device.read(startedAt);
    const asked = before.cell_constant_per_cm * 1.02;
    const { reply, isSettingsChange } = device.obey({
      v: 1,
      id: 'c-3',
      do: 'apply-cell-constant',
      cell_constant_per_cm: asked,
    });
    expect(reply.done).toBe(true);
    expect(isSettingsChange).toBe(true);
    const after = device.birth(startedAt);
    // Five significant digits: half a step is 5e-5 of the value at most.
    expect(after.cell_constant_per_cm / asked).toBeCloseTo(1, 4);
    expect(after.settings).not.toBe(before.settings);
    const again = device.read(startedAt);
    expect(again.conductivity_us_cm! / reading.conductivity_us_cm!).toBeCloseTo(1.02, 3);
    expect(device.pack([again], startedAt)[0]!.settings).toBe(after.settings);
  });

  it('does nothing twice when a command comes twice', () => {
    const command = {
      v: 1 as const,
      id: 'c-4',
      do: 'apply-cell-constant' as const,
      cell_constant_per_cm: 0.51,
    };
    const first = device.obey(command);
    device.setCellConstant(0.49);
    const second = device.obey(command);
    expect(second.reply).toEqual(first.reply);
    expect(second.isSettingsChange).toBe(false);
    expect(device.state.cellConstantInUsePerCm).toBe(0.49);
  });

  it('refuses a cell constant no probe of its build can have', () => {
    const before = device.settingsHash;
    const { reply } = device.obey({ v: 1, id: 'c-5', do: 'apply-cell-constant', cell_constant_per_cm: 5 });
    expect(reply).toMatchObject({ done: false, text: expect.stringContaining('50 %') });
    expect(device.settingsHash).toBe(before);
  });

  it('reads the bottle it stands in, and says which', () => {
    device.immerse({ solution: kcl, temperatureC: 24.8 }, 'calibration', startedAt);
    const readings = readMany(80);
    const last = readings.at(-1)!;
    expect(last).toMatchObject({ context: 'calibration', solution: 'KC-26-031' });
    expect(last.temperature_c).toBeCloseTo(24.8, 0);
    const implied =
      (device.state.cellConstantInUsePerCm * certifiedConductivity(kcl, last.temperature_c!)) /
      last.conductivity_us_cm!;
    // Immersion spread 0.08 % and a sensor offset of some hundredths of a degree: four standard deviations are 0.6 %.
    expect(Math.abs(implied / device.profile.newCellConstantPerCm - 1)).toBeLessThan(0.006);
    device.backToProcess();
    expect(device.read(startedAt + 500_000)).toMatchObject({ context: 'process', solution: null });
  });

  it('checks itself in its flow cell every few hours of its world', () => {
    device = makeDevice(
      { physicsAt: (wall) => startedAt + (wall - startedAt) * 3600 },
      { check: { solution: kcl.code, everyHours: 6 } },
    );
    // An hour passes with every second: 60 readings a second apart are two and a half days.
    const readings = readMany(60, 1000);
    const checks = readings.filter(({ context }) => context === 'check');
    expect(checks.length).toBeGreaterThanOrEqual(8);
    expect(checks.length).toBeLessThanOrEqual(11);
    for (const check of checks) {
      expect(check.solution).toBe(kcl.code);
      expect(
        Math.abs(check.conductivity_us_cm! / certifiedConductivity(kcl, check.temperature_c!) - 1),
      ).toBeLessThan(0.03);
    }
    expect(
      readings.filter(({ context }) => context === 'maintenance').every(({ solution }) => solution === null),
    ).toBe(true);
  });

  it('shows next to nothing when held dry in air', () => {
    device.holdInAir('calibration');
    const reading = device.read(startedAt);
    expect(reading.flags).toContain('dry');
    expect(reading.conductivity_us_cm).toBeLessThan(1);
  });
});

describe('faults', () => {
  it('a flat line repeats one value under new numbers and times', () => {
    const device = makeDevice();
    device.read(startedAt);
    device.faults.add('flat-line');
    const readings = Array.from({ length: 20 }, (_, index) => device.read(startedAt + 5000 * (index + 1)));
    expect(new Set(readings.map((one) => one.conductivity_us_cm)).size).toBe(1);
    expect(new Set(readings.map((one) => one.n)).size).toBe(20);
    device.faults.delete('flat-line');
    const moving = Array.from({ length: 20 }, (_, index) => device.read(startedAt + 200_000 + 5000 * index));
    expect(new Set(moving.map((one) => one.conductivity_us_cm)).size).toBeGreaterThan(5);
  });

  it('an open temperature sensor gives no temperature and says so, within the contract', () => {
    const device = makeDevice();
    device.faults.add('t-open');
    const message = device.pack([device.read(startedAt)], startedAt)[0]!;
    expect(readingsMessage.parse(message).readings[0]).toMatchObject({
      temperature_c: null,
      quality: 'bad',
      flags: expect.arrayContaining(['t_open']),
    });
  });

  it('spikes are rare and far off', () => {
    const device = makeDevice();
    device.faults.add('spikes');
    const values = Array.from(
      { length: 400 },
      (_, index) => device.read(startedAt + 5000 * index).conductivity_us_cm!,
    );
    const middle = [...values].sort((a, b) => a - b)[200]!;
    const spikes = values.filter((value) => Math.abs(value / middle - 1) > 0.3);
    expect(spikes.length).toBeGreaterThan(10);
    expect(spikes.length).toBeLessThan(80);
  });

  it('a wrong clock is ahead by half an hour', () => {
    const device = makeDevice();
    device.faults.add('clock-wrong');
    expect(Date.parse(device.read(startedAt).at) - startedAt).toBe(30 * 60_000);
  });

  it('every damaged message is refused by the contract', () => {
    const device = makeDevice();
    const message = device.pack([device.read(startedAt)], startedAt)[0]!;
    for (let turn = 0; turn < 5; turn += 1) {
      const text = damage(message, turn);
      const parsed = (() => {
        try {
          return JSON.parse(text) as unknown;
        } catch {
          return text;
        }
      })();
      expect(readingsMessage.safeParse(parsed).success, `injury ${turn}`).toBe(false);
    }
  });
});

/** What can go wrong with a device, on request, so that people see how Saltmark answers. */
import type { MqttReading } from '../shared/contracts/mqtt.ts';
import { uniformAt } from './random.ts';

export const faultKinds = {
  'flat-line': 'the same value again and again, as from a blocked cell or a hung converter',
  spikes: 'now and then a value far off, as from bubbles',
  't-open': 'the temperature sensor’s lead is broken: no temperature',
  offline: 'the link is down: the will is published, readings are buffered and sent late afterwards',
  'clock-wrong': 'the device clock is 30 minutes ahead',
  duplicate: 'every message is sent twice',
  flood: 'fifty times as many readings',
  malformed: 'every fourth message is damaged, in another way each time',
} as const;
export type FaultKind = keyof typeof faultKinds;

export const clockErrorMs = 30 * 60_000;
export const floodFactor = 50;
/** One reading in this many is a spike. */
const SPIKE_EVERY = 12;

/** Applies the faults that change a reading's content. `held` is the reading when the line went flat. */
export function distort(
  reading: MqttReading,
  faults: ReadonlySet<FaultKind>,
  held: MqttReading | null,
  seed: number,
): MqttReading {
  let distorted = reading;
  if (faults.has('flat-line') && held) {
    const { conductivity_us_cm, conductance_us, temperature_c } = held;
    distorted = { ...distorted, conductivity_us_cm, conductance_us, temperature_c };
  }
  if (faults.has('spikes') && uniformAt(seed ^ 0x5b1c, reading.n) < 1 / SPIKE_EVERY) {
    const factor = uniformAt(seed ^ 0x5b1d, reading.n) < 0.5 ? 0.35 : 1.9;
    distorted = {
      ...distorted,
      conductivity_us_cm: scaled(distorted.conductivity_us_cm, factor),
      conductance_us: scaled(distorted.conductance_us, factor),
    };
  }
  if (faults.has('t-open')) {
    distorted = { ...distorted, temperature_c: null, quality: 'bad', flags: [...distorted.flags, 't_open'] };
  }
  return distorted;
}

function scaled(value: number | null | undefined, factor: number): number | null {
  return value == null ? null : Math.round(value * factor * 1000) / 1000;
}

/** Damages a message on its way out: a different injury each time, none of them valid. */
export function damage(message: object, turn: number): string {
  const text = JSON.stringify(message);
  switch (turn % 5) {
    case 0:
      return text.slice(0, Math.floor(text.length / 2));
    case 1:
      return JSON.stringify({ ...message, v: 99 });
    case 2:
      return JSON.stringify({ ...message, readings: [] });
    case 3:
      return text.replace(/"conductivity_us_cm":[^,]+/, '"conductivity_us_cm":"1.06 mS/cm"');
    default:
      return JSON.stringify({ ...message, boot: null });
  }
}

/** Sorts the arrivals of a group by what has to be done with them, and finds the device of each. */
import type { BirthMessage, ReplyMessage } from '../../shared/contracts/mqtt.ts';
import type { DeviceDirectory, Device } from './device-directory.ts';
import type { Arrival, ReadingsContent } from './message.ts';
import { planPresence, type PresenceInput, type PresencePlan } from './presence.ts';
import { quarantineRows, type QuarantineRow } from './quarantine.ts';

export interface HeardReadings {
  device: Device;
  content: ReadingsContent;
  receivedAtMs: number;
}

export interface GatheredGroup {
  readings: HeardReadings[];
  presence: PresencePlan;
  replies: { deviceName: string; reply: ReplyMessage }[];
  quarantine: QuarantineRow[];
  /** Every device that said anything usable. */
  heard: { device: Device; receivedAtMs: number; sentMs: number | null; clockSource: string | null }[];
}

export async function gatherGroup(
  arrivals: readonly Arrival[],
  directory: DeviceDirectory,
): Promise<GatheredGroup> {
  const readings: HeardReadings[] = [];
  const input: PresenceInput = { births: [], states: [], events: [] };
  const replies: GatheredGroup['replies'] = [];
  const quarantine: QuarantineRow[] = [];
  const heard: GatheredGroup['heard'] = [];
  for (const arrival of arrivals) {
    if (arrival.refusals.length > 0) quarantine.push(...quarantineRows(arrival));
    const { content, envelope } = arrival;
    if (content === null) continue;
    const name = envelope.deviceName ?? '';
    const device = directory.cached(name) ?? (await directory.find(name));
    if (!device || device.isRevoked) {
      quarantine.push(...quarantineRows({ ...arrival, refusals: [unknownDevice(name, device)] }));
      continue;
    }
    const { receivedAtMs } = envelope;
    const isReadings = content.kind === 'readings';
    heard.push({
      device,
      receivedAtMs,
      sentMs: isReadings ? content.sentMs : null,
      clockSource: isReadings ? content.clockSource : null,
    });
    switch (content.kind) {
      case 'readings':
        readings.push({ device, content, receivedAtMs });
        break;
      case 'birth':
        input.births.push({ device, receivedAtMs, said: content.birth });
        break;
      case 'state':
        input.states.push({ device, receivedAtMs, said: content.state });
        break;
      case 'event':
        input.events.push({ device, receivedAtMs, said: content.event, atMs: content.atMs });
        break;
      case 'reply':
        replies.push({ deviceName: name, reply: content.reply });
        break;
    }
  }
  return { readings, presence: planPresence(input), replies, quarantine, heard };
}

function unknownDevice(name: string, device: Device | null): Arrival['refusals'][number] {
  const reason = device
    ? `The credentials of ${name} were withdrawn.`
    : `No device called ${name} is registered.`;
  return { code: 'device-unknown', reason };
}

/** Cell constants that births of this very group tell, by device and settings hash. */
export function toldCellConstants(
  births: readonly { device: Device; said: BirthMessage }[],
): (deviceId: number, settingsHash: string) => number | null {
  const told = new Map<string, number>();
  for (const { device, said } of births) told.set(`${device.id}/${said.settings}`, said.cell_constant_per_cm);
  return (deviceId, settingsHash) => told.get(`${deviceId}/${settingsHash}`) ?? null;
}

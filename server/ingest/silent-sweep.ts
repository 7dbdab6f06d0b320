/**
 * The last will says that a device is gone, unless the broker went with it: after a crash nobody publishes wills.
 * Once a minute, every device that is on record as online and holds no connection is recorded as lost.
 */
import { payloadVersion, topicOf, type StateMessage } from '../../shared/contracts/mqtt.ts';
import type { Parts } from '../parts.ts';
import type { DeviceDirectory } from './device-directory.ts';
import type { Intake } from './intake.ts';

/** Long enough for all devices to come back after a restart of the server. */
const sweepMs = 60_000;

export function sweepSilent(options: {
  parts: Pick<Parts, 'clock' | 'log'>;
  directory: DeviceDirectory;
  intake: Intake;
  isConnected: (name: string) => boolean;
  everyMs?: number;
}): { stop: () => void } {
  const { parts, directory, intake, isConnected, everyMs = sweepMs } = options;
  const sweep = (): void => {
    for (const { name, bootText } of directory.onlineDevices()) {
      if (bootText === null || isConnected(name)) continue;
      const state: StateMessage = { v: payloadVersion, boot: bootText, online: false, why: 'lost' };
      const envelope = {
        topic: topicOf(name, 'state'),
        payload: Buffer.from(JSON.stringify(state)),
        deviceName: name,
        clientId: null,
        receivedAtMs: parts.clock.now().getTime(),
      };
      intake.take(envelope, 'state').catch((error: unknown) => {
        parts.log.warn({ err: error, device: name }, 'a lost device could not be recorded');
      });
    }
  };
  const timer = setInterval(sweep, everyMs);
  return { stop: () => clearInterval(timer) };
}

/** Who may publish and read what: a device speaks under its own name only and reads only its own commands. */
import { parseTopic, topicOf, type TopicKind } from '../../shared/contracts/mqtt.ts';
import type { Refusal } from './message.ts';

/** What a device may publish; `command` is the server's. */
export type DeviceKind = Exclude<TopicKind, 'command'>;

/** Kinds whose last message a broker may keep and show to a later subscriber. */
const retainedKinds: ReadonlySet<TopicKind> = new Set(['birth', 'state']);

export type TopicVerdict = { kind: DeviceKind; mayRetain: boolean } | { refusal: Refusal };

/** Judges the topic a device publishes on. `device` is the name it signed in with. */
export function judgePublish(device: string, topic: string): TopicVerdict {
  const parsed = parseTopic(topic);
  if (!parsed || parsed.kind === 'command') {
    return {
      refusal: {
        code: 'topic-unknown',
        reason: `${device} published on ${topic}, which devices do not use.`,
      },
    };
  }
  if (parsed.device !== device) {
    return {
      refusal: { code: 'device-wrong', reason: `${device} published under the name of ${parsed.device}.` },
    };
  }
  return { kind: parsed.kind, mayRetain: retainedKinds.has(parsed.kind) };
}

/** Equality, not matching: a filter with a wildcard, `$share` or `$SYS` is never a device's own command topic. */
export const maySubscribe = (device: string, filter: string): boolean =>
  filter === topicOf(device, 'command');

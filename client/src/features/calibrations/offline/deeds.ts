import type {
  CaptureReading,
  ExcludeCapture,
  FinishStep,
  StepData,
} from '../../../../../shared/contracts/calibrations.ts';

/** One deed of a run: done once at the probe, sent once to the server, with its own key and time. */
export type Deed =
  | { kind: 'capture'; calibrationId: number; body: CaptureReading }
  | { kind: 'exclude'; calibrationId: number; captureKey: string; body: ExcludeCapture }
  | { kind: 'step'; calibrationId: number; body: FinishStep };

/** A deed as it lies on this phone. */
export interface QueuedDeed {
  /** Place in the queue; deeds go up in this order. */
  order: number;
  /** Whose deed it is: nobody else's session may send it. */
  userId: number;
  deed: Deed;
  /** Null while it waits to be sent; else why the server did not accept it. */
  refusal: { code: string; reason: string; at: string } | null;
}

export const keyOf = (deed: Deed): string => deed.body.key;

const newKey = (): string => crypto.randomUUID();

/** A step with nothing but what it recorded. */
export function stepDeed(calibrationId: number, data: StepData, capturedAt: string): Deed {
  return { kind: 'step', calibrationId, body: { key: newKey(), capturedAt, data } };
}

export function captureDeed(calibrationId: number, reading: Omit<CaptureReading, 'key'>): Deed {
  return { kind: 'capture', calibrationId, body: { key: newKey(), ...reading } };
}

export function excludeDeed(
  calibrationId: number,
  captureKey: string,
  reason: Omit<ExcludeCapture, 'key'>,
): Deed {
  return { kind: 'exclude', calibrationId, captureKey, body: { key: newKey(), ...reason } };
}

/**
 * The same typed reading, confirmed by the person after the server asked: a new deed, because a key stands for one
 * content for ever.
 */
export function confirmedCapture(deed: Extract<Deed, { kind: 'capture' }>): Deed {
  return { ...deed, body: { ...deed.body, key: newKey(), isConfirmed: true } };
}

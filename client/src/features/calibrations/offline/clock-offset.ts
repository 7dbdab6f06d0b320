/** One answer of the server: its clock in whole seconds, and this phone's clock around the exchange. */
export interface ClockSample {
  serverMs: number;
  sentMs: number;
  receivedMs: number;
}

/** Bounds of (phone − server), ms, and when they were last narrowed. */
export interface OffsetBounds {
  lowMs: number;
  highMs: number;
  atMs: number;
}

/** A `Date` header is cut to the second: the server's clock stood somewhere within it. */
const HEADER_STEP_MS = 1000;
/** Phone clocks drift and are set by the network; older bounds are forgotten. */
const FORGET_AFTER_MS = 30 * 60_000;

/**
 * Narrows what is known of this phone's clock against the server's by one more answer. The server answered between
 * sending and receiving, and its clock lay within the second of the header; what all answers allow together is much
 * narrower than a second.
 */
export function narrowOffset(known: OffsetBounds | null, sample: ClockSample): OffsetBounds {
  const fresh = {
    lowMs: sample.sentMs - sample.serverMs - HEADER_STEP_MS,
    highMs: sample.receivedMs - sample.serverMs,
    atMs: sample.receivedMs,
  };
  if (!known || sample.receivedMs - known.atMs > FORGET_AFTER_MS) return fresh;
  const lowMs = Math.max(known.lowMs, fresh.lowMs);
  const highMs = Math.min(known.highMs, fresh.highMs);
  // One of the clocks was set in between: what was known is void.
  return lowMs > highMs ? fresh : { lowMs, highMs, atMs: sample.receivedMs };
}

/** The offset (phone − server) in the middle of its bounds, ms. */
export function offsetOf(bounds: OffsetBounds | null): number | null {
  return bounds ? Math.round((bounds.lowMs + bounds.highMs) / 2) : null;
}

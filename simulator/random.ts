/**
 * Chance that can be asked again: every draw is a hash of (seed, index), so a probe's noise at a moment is the
 * same in the history generator, in the live simulator and in a resend, whatever was drawn in between.
 */

/** Mixes seed and index into 32 well-spread bits (the 32-bit finaliser of MurmurHash3, public domain). */
export function hash32(seed: number, index: number): number {
  let h =
    Math.imul(seed | 0, 0x9e3779b1) ^ (index | 0) ^ Math.imul(Math.floor(index / 0x1_0000_0000), 0x27d4eb2f);
  h ^= h >>> 16;
  h = Math.imul(h, 0x85ebca6b);
  h ^= h >>> 13;
  h = Math.imul(h, 0xc2b2ae35);
  h ^= h >>> 16;
  return h >>> 0;
}

/** Uniform in [0, 1). */
export function uniformAt(seed: number, index: number): number {
  return hash32(seed, index) / 0x1_0000_0000;
}

/** Standard normal by Box and Muller (Ann. Math. Stat. 29 (1958) 610); 1 − u keeps the logarithm finite. */
export function normalAt(seed: number, index: number): number {
  const radius = Math.sqrt(-2 * Math.log(1 - uniformAt(seed, index)));
  return radius * Math.cos(2 * Math.PI * uniformAt(seed ^ 0x5bd1e995, index));
}

/** Smooth noise of about unit size that wanders over `period`: random values at whole periods, eased between. */
export function wanderAt(seed: number, at: number, period: number): number {
  const position = at / period;
  const index = Math.floor(position);
  const share = position - index;
  const eased = share * share * (3 - 2 * share);
  const from = 2 * uniformAt(seed, index) - 1;
  const to = 2 * uniformAt(seed, index + 1) - 1;
  return from + (to - from) * eased;
}

/** A seed of its own for every name, so that adding one probe to a fleet changes no other. */
export function seedFor(seed: number, name: string): number {
  let h = seed | 0;
  for (let i = 0; i < name.length; i += 1) h = hash32(h, name.charCodeAt(i) + i * 256);
  return h;
}

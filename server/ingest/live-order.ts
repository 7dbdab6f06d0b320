/** How far the live view has come, per probe: only later readings of the device move it on. */
import { isAfter } from './boot-order.ts';

export interface LivePosition {
  deviceId: number;
  boot: string;
  n: number;
  atMs: number;
}

/** Boots of two devices cannot be compared: when a probe changes its device, the later reading counts. */
export function movesOn(next: LivePosition, shown: LivePosition | undefined): boolean {
  if (!shown) return true;
  return next.deviceId === shown.deviceId ? isAfter(next, shown) : next.atMs >= shown.atMs;
}

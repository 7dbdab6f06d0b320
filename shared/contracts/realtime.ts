/** The two kinds of live update, and what a browser may ask to watch. */
import type { Slice } from './vocabulary.ts';

export type ChangeKind = 'created' | 'changed' | 'removed';
export interface Changed {
  slice: Slice;
  id: number | string;
  kind: ChangeKind;
}
/** One judged point of the stream; the same value as a refetch would give. */
export interface LivePoint {
  at: string;
  conductivityUsCm: number | null;
  temperatureC: number | null;
  valueUsCm: number | null;
  context: string;
  quality: string;
  flags: string[];
  /** Which reading of the device this is, for a capture that names it. */
  boot?: string;
  n?: number;
}
export interface ReadingsUpdate {
  probe: number;
  points: LivePoint[];
}
export interface ServerToClient {
  changed: (update: Changed) => void;
  readings: (update: ReadingsUpdate) => void;
}
export type WatchTarget = { site: number } | { probe: number };
export interface ClientToServer {
  watch: (target: WatchTarget, answer?: (joined: boolean) => void) => void;
  unwatch: (target: WatchTarget) => void;
}

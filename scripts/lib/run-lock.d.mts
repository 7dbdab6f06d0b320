import type { KnownProcess } from './processes.mjs';

export interface LockEntry {
  holder: KnownProcess;
  children: (KnownProcess & { stopSignal?: NodeJS.Signals })[];
  address?: string;
}
export interface Lock {
  addChild(pid: number, stopSignal?: NodeJS.Signals): void;
  removeChild(pid: number): void;
  release(): void;
}
export function holderOf(file: string): LockEntry | undefined;
export function takeLock(
  file: string,
  about?: Record<string, unknown>,
): Promise<{ lock?: Lock; takenBy?: LockEntry }>;

export interface KnownProcess {
  pid: number;
  /** The kernel's start tick: tells this process from a later one with the same pid. */
  bornAt: string;
}
export function identify(pid: number): KnownProcess;
export function isAlive(known: KnownProcess): boolean;
export function signal(pid: number, name: NodeJS.Signals): void;
export function waitForEnd(known: KnownProcess, timeoutMs: number): Promise<boolean>;

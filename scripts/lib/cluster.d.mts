import type { DatabaseUrls } from './databases.mjs';

export interface Cluster extends DatabaseUrls {
  pid: number;
  port: number;
  folder: string;
  /** Resolves when the server has ended, for whatever reason. */
  exited: Promise<number | null>;
  remembered: Record<string, unknown>;
  remember(facts: Record<string, unknown>): void;
  stop(): Promise<void>;
}

export interface ClusterOptions {
  dir: string;
  port?: number;
  /** False only where losing the data does not matter (tests). */
  fsync?: boolean;
  log?: string;
}

export function startCluster(options: ClusterOptions): Promise<Cluster>;
export function runningCluster(dir: string): DatabaseUrls | undefined;

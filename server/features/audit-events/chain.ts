/** The chain's arithmetic, shared by the writer and the verifier: canonical JSON (RFC 8785), then SHA-256 (FIPS 180-4). */
import { canonicalJson, sha256Hex } from '../../lib/hashing.ts';

export interface ChainedEvent {
  sequence: number;
  capturedAt: string;
  receivedAt: string;
  actorKind: 'user' | 'device' | 'system';
  actorId: number | null;
  actorName: string;
  actingRole: string | null;
  action: string;
  objectKind: string;
  objectId: string | null;
  objectVersion: number | null;
  siteId: number | null;
  oldValue: unknown;
  newValue: unknown;
  reason: string | null;
  source: unknown;
  previousHash: string;
}

/** Values as JSON has them: what PostgreSQL gives back must hash to the same. */
export const asJson = (value: unknown): unknown =>
  value === undefined || value === null
    ? null
    : (JSON.parse(JSON.stringify(value).replaceAll('\\u0000', '\\ufffd')) as unknown);

export const hashOfEvent = (event: ChainedEvent): string => sha256Hex(canonicalJson(event));

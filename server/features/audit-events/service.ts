/**
 * The one way into the audit trail. Call it inside the transaction that makes the change, as its last
 * statement: the chain is locked from here to commit, so that concurrent writers keep one unbroken chain.
 */
import type { Transaction } from 'sequelize';
import type { Role } from '../../../shared/contracts/vocabulary.ts';
import { AuditEvent } from '../../db/models/index.ts';
import { roleAt, type Actor } from '../../http/actor.ts';
import type { Parts } from '../../parts.ts';
import { asJson, hashOfEvent, type ChainedEvent } from './chain.ts';
import { takeChainHead } from './queries.ts';

export interface AuditEntry {
  /** Slice and past participle: `probes.registered`. */
  action: string;
  objectKind: string;
  objectId: number | string | null;
  objectVersion?: number | null;
  /** Site whose people may read the entry; null = organisation-wide. */
  siteId: number | null;
  oldValue?: unknown;
  newValue?: unknown;
  reason?: string | null;
  /** When the person did it, if not now (work carried in later). */
  capturedAt?: Date;
}

/** Who acts when no person does. */
export interface OtherActor {
  kind: 'device' | 'system';
  id?: number;
  name: string;
  source?: unknown;
}

export type AuditActor = Actor | OtherActor;

const isPerson = (actor: AuditActor): actor is Actor => 'userId' in actor;

function describeActor(
  actor: AuditActor,
  siteId: number | null,
): Pick<ChainedEvent, 'actorKind' | 'actorId' | 'actorName' | 'actingRole' | 'source'> {
  if (!isPerson(actor)) {
    return {
      actorKind: actor.kind,
      actorId: actor.id ?? null,
      actorName: actor.name,
      actingRole: null,
      source: asJson(actor.source) ?? {},
    };
  }
  const role: Role | null = roleAt(actor, siteId) ?? actor.grants[0]?.role ?? null;
  return {
    actorKind: 'user',
    actorId: actor.userId,
    actorName: actor.name,
    actingRole: role,
    source: asJson(actor.source),
  };
}

/** Writes one event and returns its sequence number. */
export async function recordAuditEvent(
  parts: Parts,
  transaction: Transaction,
  actor: AuditActor,
  entry: AuditEntry,
): Promise<number> {
  const head = await takeChainHead(parts.sequelize, transaction);
  const now = parts.clock.now();
  const event: ChainedEvent = {
    sequence: head.sequence + 1,
    capturedAt: (entry.capturedAt ?? now).toISOString(),
    receivedAt: now.toISOString(),
    ...describeActor(actor, entry.siteId),
    action: entry.action,
    objectKind: entry.objectKind,
    objectId: entry.objectId === null ? null : String(entry.objectId),
    objectVersion: entry.objectVersion ?? null,
    siteId: entry.siteId,
    oldValue: asJson(entry.oldValue),
    newValue: asJson(entry.newValue),
    reason: entry.reason ?? null,
    previousHash: head.hash,
  };
  const { source, ...columns } = event;
  await AuditEvent.create(
    {
      ...columns,
      source: source as Record<string, unknown>,
      capturedAt: new Date(event.capturedAt),
      receivedAt: now,
      hash: hashOfEvent(event),
    },
    { transaction },
  );
  return event.sequence;
}

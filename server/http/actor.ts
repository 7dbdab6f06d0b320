/** Who is asking, with which rights: read fresh from the database on every request. */
import type { Role } from '../../shared/contracts/vocabulary.ts';

export interface ActorGrant {
  siteId: number | null;
  role: Role;
}

export interface RequestSource {
  /** Class of the address, never more than needed: loopback, private or public. */
  address: string;
  requestId: string;
}

export interface Actor {
  userId: number;
  name: string;
  email: string;
  grants: readonly ActorGrant[];
  source: RequestSource;
}

/** The role at one site: its own grant, else the all-sites grant, else null. `null` site = organisation-wide. */
export function roleAt(actor: Pick<Actor, 'grants'>, siteId: number | null): Role | null {
  const own = siteId === null ? undefined : actor.grants.find((grant) => grant.siteId === siteId);
  return (own ?? actor.grants.find((grant) => grant.siteId === null))?.role ?? null;
}

/** Sites the actor may read; `null` = all of them. */
export function readableSites(actor: Pick<Actor, 'grants'>): number[] | null {
  if (actor.grants.some((grant) => grant.siteId === null)) return null;
  return actor.grants.map((grant) => grant.siteId).filter((siteId): siteId is number => siteId !== null);
}

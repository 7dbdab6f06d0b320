/** Sites and the areas that group their measuring points. */
import type { ChangeSite, CreateArea, CreateSite } from '../../../shared/contracts/sites.ts';
import type { ListOf, ListQuery } from '../../../shared/contracts/common.ts';
import { Area, Site } from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { authorise, may } from '../../http/authorise.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { changesBetween } from '../../lib/changes.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { sitePolicy } from './policy.ts';
import { countSites, selectSites, type AreaRow, type SiteRow } from './queries.ts';

const codes = { notFound: 'sites.not-found', forbidden: 'sites.forbidden' } as const;
const areaCodes = { notFound: 'areas.not-found', forbidden: 'sites.forbidden' } as const;
const siteTaken = { sites_code_key: 'sites.code-taken', sites_code_lower_key: 'sites.code-taken' } as const;
const areaTaken = { areas_site_id_name_key: 'sites.area-taken' } as const;

/** The sites the person has a role at, by name. */
export async function listSites(parts: Parts, actor: Actor, query: ListQuery): Promise<ListOf<SiteRow>> {
  const after = readCursor(query.cursor, ['text', 'integer']);
  const filter = { siteIds: readableSites(actor), pattern: containsPattern(query.q) };
  const [found, total] = await Promise.all([
    selectSites(parts, filter, after, query.limit + 1),
    countSites(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.sortName, row.id]);
  return { items: rows, total, nextCursor };
}

export async function readSite(parts: Parts, actor: Actor, id: number): Promise<SiteRow> {
  authorise(sitePolicy, 'read', actor, id, codes);
  const [row] = await selectSites(parts, { siteIds: [id], pattern: null }, null, 1);
  if (!row) throw new AppError('sites.not-found');
  return row;
}

export type BoardSite = Pick<SiteRow, 'id' | 'code' | 'name' | 'timeZone'>;

/** The sites of a live board, by name; null = every site. */
export async function sitesForBoard(parts: Parts, siteIds: number[] | null): Promise<BoardSite[]> {
  const rows = await selectSites(parts, { siteIds, pattern: null }, null, null);
  return rows.map(({ id, code, name, timeZone }) => ({ id, code, name, timeZone }));
}

async function lockSite(
  transaction: OpenTransaction,
  actor: Actor,
  action: 'change' | 'addArea',
  id: number,
): Promise<Site> {
  authorise(sitePolicy, action, actor, id, codes);
  const site = await Site.findOne({
    where: { id, retiredAt: null },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!site) throw new AppError('sites.not-found');
  return site;
}

export async function createSite(parts: Parts, actor: Actor, input: CreateSite): Promise<SiteRow> {
  if (!may(sitePolicy, 'create', actor, null)) throw new AppError('sites.forbidden');
  const id = await refusingByConstraint(siteTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const site = await Site.create({ ...input, retiredAt: null }, { transaction });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'sites.created',
        objectKind: 'sites',
        objectId: site.id,
        objectVersion: site.version,
        siteId: site.id,
        newValue: input,
      });
      // Nobody has joined the room of a site that did not exist; the event names it and says nothing else.
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'sites', id: site.id, kind: 'created' }, null),
      );
      return site.id;
    }),
  );
  return readSite(parts, actor, id);
}

export async function changeSite(
  parts: Parts,
  actor: Actor,
  id: number,
  { reason, version, ...patch }: ChangeSite,
): Promise<SiteRow> {
  await inTransaction(parts.sequelize, async (transaction) => {
    const site = await lockSite(transaction, actor, 'change', id);
    if (site.version !== version) throw new AppError('sites.changed-meanwhile');
    const changes = changesBetween(site.get(), patch);
    if (!changes) return;
    await site.update(changes.newValue, { transaction });
    await recordAuditEvent(parts, transaction, actor, {
      action: 'sites.changed',
      objectKind: 'sites',
      objectId: id,
      objectVersion: site.version,
      siteId: id,
      ...changes,
      reason,
    });
    transaction.afterCommit(() => parts.broadcast.changed({ slice: 'sites', id, kind: 'changed' }, id));
  });
  return readSite(parts, actor, id);
}

/** Areas are shown inside their site, so that both are told to be stale. */
function announceArea(parts: Parts, area: Area, kind: 'created' | 'changed'): void {
  parts.broadcast.changed({ slice: 'areas', id: area.id, kind }, area.siteId);
  parts.broadcast.changed({ slice: 'sites', id: area.siteId, kind: 'changed' }, area.siteId);
}

async function readArea(parts: Parts, actor: Actor, area: Area): Promise<AreaRow> {
  const site = await readSite(parts, actor, area.siteId);
  const row = site.areas.find(({ id }) => id === area.id);
  if (!row) throw new AppError('areas.not-found');
  return row;
}

export async function addArea(
  parts: Parts,
  actor: Actor,
  siteId: number,
  input: CreateArea,
): Promise<AreaRow> {
  const area = await refusingByConstraint(areaTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      await lockSite(transaction, actor, 'addArea', siteId);
      const last = await Area.max<number | null, Area>('position', { where: { siteId }, transaction });
      const row = await Area.create({ ...input, siteId, position: (last ?? -1) + 1 }, { transaction });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'areas.created',
        objectKind: 'areas',
        objectId: row.id,
        siteId,
        newValue: { name: row.name, position: row.position },
      });
      transaction.afterCommit(() => announceArea(parts, row, 'created'));
      return row;
    }),
  );
  return readArea(parts, actor, area);
}

export async function renameArea(
  parts: Parts,
  actor: Actor,
  id: number,
  input: { name: string; reason: string },
): Promise<AreaRow> {
  const area = await refusingByConstraint(areaTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const row = await Area.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
      if (!row) throw new AppError('areas.not-found');
      authorise(sitePolicy, 'change', actor, row.siteId, areaCodes);
      const oldName = row.name;
      if (oldName === input.name) return row;
      await row.update({ name: input.name }, { transaction });
      await recordAuditEvent(parts, transaction, actor, {
        action: 'areas.renamed',
        objectKind: 'areas',
        objectId: id,
        siteId: row.siteId,
        oldValue: { name: oldName },
        newValue: { name: row.name },
        reason: input.reason,
      });
      transaction.afterCommit(() => announceArea(parts, row, 'changed'));
      return row;
    }),
  );
  return readArea(parts, actor, area);
}

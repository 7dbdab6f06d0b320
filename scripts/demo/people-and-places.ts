import { Area, Membership, Point, Setting, Site, User } from '../../server/db/models/index.ts';
import { hashPassword } from '../../server/lib/hashing.ts';
import { demoPassword, people } from '../../simulator/scenario/people.ts';
import { points } from '../../simulator/scenario/points.ts';
import { organisationName, sites } from '../../simulator/scenario/sites.ts';
import { dayMs, dayOf, need, type Loading } from './loading.ts';

export async function loadPlaces(loading: Loading): Promise<void> {
  const { history, trail } = loading;
  await Setting.create({
    key: 'organisation',
    value: { name: organisationName },
    updatedAt: new Date(history.startAt),
  });
  for (const one of sites) {
    const site = await Site.create({
      code: one.code,
      name: one.name,
      timeZone: one.timeZone,
      retiredAt: null,
    });
    loading.sites.set(one.key, site.id);
    const created = { action: 'sites.created', objectKind: 'sites', objectId: site.id, siteId: site.id };
    trail.push({
      ...created,
      newValue: { code: one.code, name: one.name },
      at: history.startAt - 20 * dayMs,
      by: 'wen',
    });
    const areaIds = new Map<string, number>();
    for (const [position, area] of one.areas.entries()) {
      const row = await Area.create({ siteId: site.id, name: area.name, position });
      areaIds.set(area.key, row.id);
    }
    for (const point of points.filter((candidate) => candidate.site === one.key))
      await loadPoint(loading, point, need(areaIds, point.area), site.id);
  }
}

async function loadPoint(
  loading: Loading,
  point: (typeof points)[number],
  areaId: number,
  siteId: number,
): Promise<void> {
  const requirements = {
    name: point.name,
    duty: point.duty,
    medium: point.medium,
    displayUnit: point.displayUnit,
    compensationModel: point.compensation.model,
    compensationCoefficientPercentPerK:
      point.compensation.coefficientPerK === null ? null : round(point.compensation.coefficientPerK * 100),
    referenceTemperatureC: point.compensation.referenceC,
    lowLimitUsCm: point.limitLowUsCm,
    highLimitUsCm: point.limitHighUsCm,
    tolerancePercent: point.tolerancePercent,
    decisionRule: point.decisionRule,
    intervalDays: point.interval.days,
    intervalMethod: point.interval.method,
    criticality: point.criticality,
    hazardTags: point.hazardTags,
  };
  const row = await Point.create({
    ...requirements,
    areaId,
    code: point.code.toUpperCase(),
    controlNote: controlNoteOf(point),
    retiredAt: null,
  });
  loading.points.set(point.code, { id: row.id, siteId });
  loading.trail.push({
    action: 'points.created',
    objectKind: 'points',
    objectId: row.id,
    objectVersion: 0,
    siteId,
    newValue: { code: row.code, ...requirements },
    at: loading.history.startAt - 15 * dayMs,
    by: 'tomas',
  });
}

const round = (value: number): number => Number(value.toPrecision(6));

const controlNoteOf = (point: (typeof points)[number]): string | null =>
  point.hazardTags.includes('control-loop')
    ? 'A control loop follows this signal: put it on hold or in manual before the probe is touched.'
    : null;

export async function loadPeople(loading: Loading): Promise<void> {
  const { history, trail } = loading;
  const passwordHash = await hashPassword(demoPassword);
  const joinedAt = history.startAt - 25 * dayMs;
  for (const person of people) {
    const user = await User.create({
      email: person.email,
      name: person.name,
      passwordHash,
      passwordChangedAt: new Date(joinedAt),
      lastSignInAt: null,
      lockedUntil: null,
      deactivatedAt: null,
      createdAt: new Date(joinedAt),
    });
    loading.users.set(person.key, user.id);
    const entry = { objectKind: 'users', objectId: user.id, at: joinedAt, by: 'wen' };
    trail.push({
      ...entry,
      action: 'users.created',
      siteId: null,
      newValue: { email: person.email, name: person.name },
    });
    for (const grant of person.grants) {
      const siteId = grant.site === null ? null : need(loading.sites, grant.site);
      const endsOn = grant.endsInDays === null ? null : dayOf(history.endAt + grant.endsInDays * dayMs);
      await Membership.create({ userId: user.id, siteId, role: grant.role, endsOn, endedAt: null });
      trail.push({
        ...entry,
        action: 'memberships.granted',
        siteId,
        newValue: { role: grant.role, siteId, endsOn },
        reason: 'Takes up the work',
      });
    }
  }
}

import type { AuditEventView } from '../../../../shared/contracts/audit-events.ts';
import { formatDateTime } from '../../../../shared/format/dates.ts';
import { labelOf, ROLE_LABELS } from '../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../shared/format/numbers.ts';
import { ACTION_WORDS, fieldWords, OBJECT_WORDS } from './words.ts';

export interface FieldChange {
  field: string;
  /** Null where there was nothing before. */
  from: string | null;
  /** Null where the entry says only what it was before. */
  to: string | null;
}

/** Old and new value field by field; what stayed the same is left out. */
export function fieldChanges(oldValue: unknown, newValue: unknown): FieldChange[] {
  const before = flatten(oldValue);
  const after = flatten(newValue);
  const paths = [...new Set([...before.keys(), ...after.keys()])];
  const isEmpty = (path: string) => !before.get(path) && after.get(path) === null;
  return paths
    .filter((path) => before.get(path) !== after.get(path) && !isEmpty(path))
    .map((path) => {
      const { name, unit } = fieldWords(path);
      const text = (values: Map<string, Leaf>) =>
        values.has(path) ? leafText(values.get(path), unit) : null;
      return { field: name, from: text(before), to: text(after) };
    });
}

type Leaf = string | number | boolean | null | undefined;

function flatten(value: unknown, path = '', into = new Map<string, Leaf>()): Map<string, Leaf> {
  if (value === null || value === undefined) {
    if (path !== '') into.set(path, null);
  } else if (Array.isArray(value)) {
    const isPlain = value.every((one) => typeof one !== 'object' || one === null);
    if (isPlain) into.set(path || 'value', value.join(', '));
    else value.forEach((one, i) => flatten(one, join(path, String(i + 1)), into));
  } else if (typeof value === 'object') {
    for (const [key, inner] of Object.entries(value)) flatten(inner, join(path, key), into);
  } else {
    into.set(path || 'value', value as Leaf);
  }
  return into;
}

const join = (path: string, key: string) => (path === '' ? key : `${path}.${key}`);

const INSTANT = /^\d{4}-\d\d-\d\dT\d\d:\d\d/;

function leafText(value: Leaf, unit: string | null): string {
  if (value === null || value === undefined || value === '') return 'nothing';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'number') return formatNumber(value, unit === null ? {} : { unit });
  if (INSTANT.test(value)) return formatDateTime(value, { seconds: true, offset: true });
  return value;
}

/** `Tomas Reik · instrument manager` */
export function actorWords(event: Pick<AuditEventView, 'actorName' | 'actorKind' | 'actingRole'>): string {
  if (event.actorKind === 'system') return 'done by the server itself';
  if (event.actorKind === 'device') return 'done by a device';
  return labelOf(ROLE_LABELS, event.actingRole);
}

/** What was done to what: `held the point no. 9`, `registered the lot KC-26-040`. */
export function deedWords(event: AuditEventView): string {
  const deed = labelOf(ACTION_WORDS, event.action);
  const isOwn = event.objectKind === 'users' && event.objectId === String(event.actorId);
  if (isOwn || event.objectId === null || event.action.startsWith('sessions.')) return deed;
  const known = NAMED.has(event.objectKind) ? (nameIn(event.newValue) ?? nameIn(event.oldValue)) : null;
  const thing = known ?? numbered(event.objectId);
  const isWorded = ACTION_WORDS[event.action] !== undefined;
  return isWorded ? `${deed} ${thing}` : `${deed}: ${labelOf(OBJECT_WORDS, event.objectKind)} ${thing}`;
}

/** Kinds whose entries carry the name of the thing itself. */
const NAMED = new Set([
  'sites',
  'areas',
  'points',
  'probes',
  'standards',
  'bottles',
  'instruments',
  'procedures',
  'users',
]);

const numbered = (id: string) => (/^\d+$/.test(id) ? `no. ${id}` : `“${id}”`);

/** The name that people know a thing by, where the entry carries it. */
function nameIn(value: unknown): string | null {
  if (typeof value !== 'object' || value === null) return null;
  const fields = value as Record<string, unknown>;
  const found = [fields['tag'], fields['code'], fields['name']].find((one) => typeof one === 'string');
  return (found as string | undefined) ?? null;
}

/** From how much later on the server received something it is worth saying. */
const DELAY_MS = 5000;

/** When it was received, where that differs from when it was captured: the device was offline meanwhile. */
export function receivedLater(event: Pick<AuditEventView, 'capturedAt' | 'receivedAt'>): string | null {
  if (Date.parse(event.receivedAt) - Date.parse(event.capturedAt) < DELAY_MS) return null;
  return formatDateTime(event.receivedAt, { seconds: true });
}

/** The bounds of whole days (UTC) as the server takes them: from the first day, up to the end of the last. */
export function dayBounds(fromDay: string, toDay: string): { from?: string; to?: string } {
  const isDay = (day: string) => /^\d{4}-\d\d-\d\d$/.test(day) && !Number.isNaN(Date.parse(day));
  return {
    ...(isDay(fromDay) ? { from: `${fromDay}T00:00:00.000Z` } : {}),
    ...(isDay(toDay) ? { to: new Date(Date.parse(toDay) + 86_400_000).toISOString() } : {}),
  };
}

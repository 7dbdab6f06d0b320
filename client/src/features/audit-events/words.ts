/** Events of the trail in words; a code that is not listed is opened, so that nothing is ever hidden. */

/** What was done, as the sentence goes on after the name of the person. */
export const ACTION_WORDS: Readonly<Record<string, string>> = {
  'areas.created': 'added the area',
  'areas.renamed': 'renamed the area',
  'bottles.discarded': 'discarded the bottle',
  'bottles.opened': 'opened the bottle',
  'bottles.received': 'received the bottle',
  'bottles.used': 'used the bottle',
  'calibrations.amended': 'amended the calibration',
  'calibrations.approved': 'approved the calibration',
  'calibrations.capture-excluded': 'set aside a reading of the calibration',
  'calibrations.command-confirmed': 'confirmed the new cell constant in the calibration',
  'calibrations.command-failed': 'could not set the new cell constant in the calibration',
  'calibrations.command-repeated': 'sent the new cell constant again in the calibration',
  'calibrations.exported': 'exported calibrations',
  'calibrations.handed-over': 'handed over the calibration',
  'calibrations.reading-captured': 'captured a reading in the calibration',
  'calibrations.record-downloaded': 'took away the record of the calibration',
  'calibrations.returned': 'returned the calibration to its performer',
  'calibrations.signed': 'signed the calibration',
  'calibrations.started': 'started the calibration',
  'calibrations.step-finished': 'finished a step of the calibration',
  'calibrations.stopped': 'stopped the calibration',
  'certificates.uploaded': 'uploaded the certificate',
  'devices.credentials-issued': 'issued device credentials for',
  'devices.credentials-replaced': 'replaced the device credentials of',
  'devices.credentials-revoked': 'withdrew the device credentials of',
  'instruments.certificate-attached': 'attached a certificate to the instrument',
  'instruments.changed': 'changed the instrument',
  'instruments.created': 'registered the instrument',
  'memberships.granted': 'gave a role to',
  'memberships.ended': 'ended a role of',
  'notices.closed': 'closed the notice',
  'points.changed': 'changed the point',
  'points.created': 'added the point',
  'points.held': 'held the point',
  'points.released': 'put back into use the point',
  'points.retired': 'retired the point',
  'probes.adjusted': 'adjusted the probe',
  'probes.changed': 'corrected what is recorded about the probe',
  'probes.installed': 'installed the probe',
  'probes.moved': 'moved the probe',
  'probes.note-added': 'wrote a note about the probe',
  'probes.registered': 'registered the probe',
  'probes.removed': 'took out the probe',
  'probes.retired': 'retired the probe',
  'procedures.issued': 'issued the procedure',
  'quarantine.resolved': 'dealt with the message',
  'sessions.ended-everywhere': 'signed out everywhere',
  'sessions.sign-in-failed': 'failed to sign in',
  'sessions.signed-in': 'signed in',
  'sessions.signed-out': 'signed out',
  'settings.changed': 'changed the setting',
  'sites.changed': 'changed the site',
  'sites.created': 'added the site',
  'standards.certificate-attached': 'attached a certificate to the lot',
  'standards.created': 'registered the lot',
  'standards.state-changed': 'changed the state of the lot',
  'users.changed': 'changed the person',
  'users.created': 'added the person',
  'users.deactivated': 'deactivated the person',
  'users.first-administrator-created': 'became the first administrator',
  'users.invited-again': 'mailed a new link to the person',
  'users.locked': 'was locked out for a time',
  'users.password-changed': 'changed the password',
  'users.unlocked': 'unlocked the person',
};

/** Kinds of things events are about; the filter offers these. */
export const OBJECT_WORDS: Readonly<Record<string, string>> = {
  sites: 'site',
  areas: 'area',
  points: 'measuring point',
  probes: 'probe',
  devices: 'device',
  standards: 'lot of reference solution',
  bottles: 'bottle',
  instruments: 'reference instrument',
  certificates: 'certificate',
  procedures: 'procedure',
  calibrations: 'calibration',
  users: 'person',
  settings: 'setting',
  quarantine: 'message in quarantine',
  notices: 'integrity notice',
};

/** Units by the ending of a field's name, longest first; what is kept of the ending belongs to the name. */
const UNIT_ENDINGS: readonly [ending: RegExp, kept: string, unit: string][] = [
  [/PercentPerK$/, '', '%/K'],
  [/Percent$/, '', '%'],
  [/PerCm$/, '', 'cm⁻¹'],
  [/UsCm$/, '', 'µS/cm'],
  [/Days$/, '', 'days'],
  [/UncertaintyC$/, 'Uncertainty', 'K'],
  [/([Tt]emperature)C$/, '$1', '°C'],
];

/** A field's name as people say it, and the unit its name carries: `cellConstantPerCm` is cell constant in cm⁻¹. */
export function fieldWords(path: string): { name: string; unit: string | null } {
  const found = UNIT_ENDINGS.find(([ending]) => ending.test(path));
  const bare = found ? path.replace(found[0], found[1]) : path;
  const name = bare
    .replace(/([a-z0-9])([A-Z])/g, '$1 $2')
    .replace(/[._-]/g, ' ')
    .toLowerCase()
    .trim();
  return { name: name || path, unit: found?.[2] ?? null };
}

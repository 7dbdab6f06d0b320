/**
 * Every code a refusal can carry, once, with the sentence people read. Kind decides the HTTP status.
 * A service throws `new AppError(code, { detail?, issues? })`.
 */
export const errorKinds = {
  invalid: 422,
  unparsable: 400,
  unauthenticated: 401,
  forbidden: 403,
  'not-found': 404,
  conflict: 409,
  'too-many': 429,
  unavailable: 503,
  internal: 500,
} as const;
export type ErrorKind = keyof typeof errorKinds;

const define = <T extends Record<string, readonly [ErrorKind, string]>>(codes: T) => codes;

export const errorCodes = define({
  'request.invalid': ['invalid', 'Some fields need another look. Each is named below.'],
  'request.unparsable': [
    'unparsable',
    'The request is not valid JSON. Send a JSON body with content type application/json.',
  ],
  'request.too-large': ['unparsable', 'The request is larger than this address accepts.'],
  'request.not-found': ['not-found', 'There is nothing at this address.'],
  'request.forgery-suspected': [
    'forbidden',
    'This write did not come from a Saltmark page. Open the page again and repeat it there.',
  ],
  'request.internal': [
    'internal',
    'Something failed on our side. Nothing was changed. Try again; if it stays, give the request id to your administrator.',
  ],
  'request.unavailable': [
    'unavailable',
    'The database does not answer at the moment. Nothing was changed. Try again shortly.',
  ],
  'request.cursor-invalid': [
    'invalid',
    'The list cursor is not one this server gave out. Start the list again without it.',
  ],

  'sessions.required': ['unauthenticated', 'Sign in first.'],
  'sessions.credentials-wrong': [
    'unauthenticated',
    'The e-mail address and password do not match. Check both and try again.',
  ],
  'sessions.locked': [
    'too-many',
    'Sign-in is locked for this person after repeated wrong passwords. Wait a quarter of an hour, or ask an administrator.',
  ],
  'sessions.too-many': ['too-many', 'Too many sign-in attempts from here. Wait a few minutes and try again.'],
  'sessions.no-grants': ['forbidden', 'Your access has ended or was never granted. Ask an administrator.'],

  'users.not-found': ['not-found', 'No such person, or not one you may see.'],
  'users.email-taken': ['conflict', 'Somebody already signs in with this e-mail address.'],
  'users.password-wrong': ['invalid', 'The current password is not right.'],
  'users.password-weak': [
    'invalid',
    'Choose a longer password: at least 12 characters, not your address or a common phrase.',
  ],
  'users.token-invalid': [
    'invalid',
    'This link was used already or has run out. Ask an administrator for a new one.',
  ],
  'users.forbidden': ['forbidden', 'Only an administrator manages people.'],
  'users.last-administrator': [
    'conflict',
    'Somebody must remain administrator of all sites. Name another one first.',
  ],
  'users.self-change': [
    'conflict',
    'You cannot take away or deactivate your own access. Ask another administrator.',
  ],
  'users.setup-done': ['conflict', 'The first administrator exists already. Sign in, or ask that person.'],
  'users.changed-meanwhile': [
    'conflict',
    'Somebody changed this person meanwhile. Reload and repeat your change.',
  ],

  'memberships.not-found': ['not-found', 'No such grant.'],
  'memberships.exists': ['conflict', 'This person already has a role there. End it first, or change it.'],
  'memberships.forbidden': ['forbidden', 'Only an administrator of that site grants or ends roles there.'],

  'sites.not-found': ['not-found', 'No such site, or not one you may see.'],
  'sites.code-taken': ['conflict', 'Another site already has this code.'],
  'sites.forbidden': ['forbidden', 'Your role at this site does not allow this.'],
  'sites.changed-meanwhile': [
    'conflict',
    'Somebody changed this site meanwhile. Reload and repeat your change.',
  ],
  'sites.area-taken': ['conflict', 'This site already has an area of that name.'],
  'areas.not-found': ['not-found', 'No such area, or not one you may see.'],

  'points.not-found': ['not-found', 'No such measuring point, or not one you may see.'],
  'points.code-taken': ['conflict', 'Another measuring point already has this code.'],
  'points.forbidden': ['forbidden', 'Your role at this site does not allow this for the measuring point.'],
  'points.changed-meanwhile': [
    'conflict',
    'Somebody changed this measuring point meanwhile. Reload and repeat your change.',
  ],
  'points.occupied': ['conflict', 'A probe is installed there. Remove or move it first.'],
  'points.retired': ['conflict', 'This measuring point is retired.'],
  'points.already-held': ['conflict', 'Somebody holds this point already.'],
  'points.not-held': ['conflict', 'Nobody holds this point.'],

  'probes.not-found': ['not-found', 'No such probe, or not one you may see.'],
  'probes.serial-taken': ['conflict', 'A probe with this serial number is registered already.'],
  'probes.tag-taken': ['conflict', 'Another probe carries this tag.'],
  'probes.forbidden': ['forbidden', 'Your role at this site does not allow this for the probe.'],
  'probes.changed-meanwhile': [
    'conflict',
    'Somebody changed this probe meanwhile. Reload and repeat your change.',
  ],
  'probes.retired': [
    'conflict',
    'This probe is retired. Its history stays readable, but it cannot be used again.',
  ],
  'probes.already-installed': ['conflict', 'This probe is installed elsewhere. Move it instead.'],
  'probes.not-installed': ['conflict', 'This probe is not installed anywhere.'],
  'probes.time-impossible': ['invalid', 'The time lies in the future or before the probe’s last move.'],

  'devices.not-found': ['not-found', 'No such device, or not one you may see.'],
  'devices.name-taken': ['conflict', 'Another device already has this name.'],
  'devices.forbidden': ['forbidden', 'Only an administrator of the site issues device credentials.'],
  'devices.exists': ['conflict', 'This probe already has working credentials. Replace or revoke them.'],
  'devices.revoked': ['conflict', 'These credentials were withdrawn. Issue new ones for the probe.'],
  'devices.offline': ['unavailable', 'The device is not connected, so it cannot be asked now.'],

  'standards.not-found': ['not-found', 'No such lot.'],
  'standards.code-taken': ['conflict', 'Another lot already has this code.'],
  'standards.forbidden': ['forbidden', 'Your role does not allow changing reference solutions.'],
  'standards.changed-meanwhile': [
    'conflict',
    'Somebody changed this lot meanwhile. Reload and repeat your change.',
  ],
  'standards.state-impossible': ['conflict', 'A recalled lot stays recalled.'],
  'standards.not-dilutable': [
    'conflict',
    'Only a released, unexpired lot of potassium chloride in water can be diluted.',
  ],

  'checks.not-found': ['not-found', 'No such check, or not one you may see.'],
  'readings.window-invalid': ['invalid', 'The period must start before it ends and span at most ten years.'],

  'quarantine.not-found': ['not-found', 'No such message.'],
  'quarantine.forbidden': ['forbidden', 'Only an administrator reads the quarantine.'],
  'quarantine.resolved': ['conflict', 'This message was dealt with already.'],
  'notices.not-found': ['not-found', 'No such notice.'],
  'notices.closed': ['conflict', 'This notice was closed already.'],

  'audit-events.forbidden': ['forbidden', 'Your role does not read the audit trail.'],
  'settings.forbidden': ['forbidden', 'Only an administrator of all sites changes settings.'],
  'settings.unknown': ['not-found', 'No such setting.'],
  'settings.changed-meanwhile': [
    'conflict',
    'Somebody changed this setting meanwhile. Reload and repeat your change.',
  ],
  'mails.forbidden': ['forbidden', 'Only an administrator reads the mail outbox.'],

  'procedures.not-found': ['not-found', 'No such procedure, or none that applies to this probe.'],
  'procedures.forbidden': ['forbidden', 'Only a manager or an administrator of all sites edits procedures.'],
  'procedures.changed-meanwhile': [
    'conflict',
    'Somebody issued a newer version meanwhile. Reload and repeat your change.',
  ],
  'procedures.order-impossible': [
    'invalid',
    'The steps of a procedure keep their order, and as found comes before cleaning and adjusting.',
  ],

  'bottles.not-found': ['not-found', 'No such bottle.'],
  'bottles.forbidden': ['forbidden', 'Your role does not allow this for bottles.'],
  'bottles.code-taken': ['conflict', 'Another bottle already has this code.'],
  'bottles.changed-meanwhile': [
    'conflict',
    'Somebody changed this bottle meanwhile. Reload and repeat your change.',
  ],
  'bottles.opened-already': ['conflict', 'This bottle was opened before. Its date of opening stays.'],
  'bottles.not-open': ['conflict', 'This bottle is not open: open it first, so that its time begins.'],
  'bottles.discarded': ['conflict', 'This bottle is discarded.'],
  'bottles.unusable': [
    'conflict',
    'This bottle cannot be used: it is discarded, past its time after opening, or its lot is not usable.',
  ],
  'instruments.not-found': ['not-found', 'No such reference instrument.'],
  'instruments.forbidden': ['forbidden', 'Your role does not allow changing reference instruments.'],
  'instruments.code-taken': ['conflict', 'Another reference instrument already has this code.'],
  'instruments.changed-meanwhile': [
    'conflict',
    'Somebody changed this instrument meanwhile. Reload and repeat your change.',
  ],
  'instruments.overdue': ['conflict', 'This reference instrument is past its due date or out of use.'],
  'certificates.forbidden': ['forbidden', 'Your role does not allow adding certificate files.'],
  'certificates.changed-meanwhile': [
    'conflict',
    'Somebody stored the same file at the same moment. Try again.',
  ],
  'certificates.not-found': ['not-found', 'No such certificate file.'],
  'certificates.type-unknown': ['invalid', 'The file is not a PDF, PNG or JPEG by its content.'],
  'certificates.too-large': ['invalid', 'The file is larger than 10 MB.'],

  'calibrations.not-found': ['not-found', 'No such calibration, or not one you may see.'],
  'calibrations.forbidden': ['forbidden', 'Your role at this site does not allow this for calibrations.'],
  'calibrations.already-running': [
    'conflict',
    'A calibration of this probe is running already. Resume it, or have it handed over.',
  ],
  'calibrations.not-installed': [
    'conflict',
    'The probe is not installed at a measuring point. Install it first.',
  ],
  'calibrations.not-performer': ['forbidden', 'Another person performs this run. Have it handed over first.'],
  'calibrations.not-running': [
    'conflict',
    'This run is finished. Nothing in it can change; write an amendment instead.',
  ],
  'calibrations.lot-unusable': [
    'conflict',
    'This lot cannot be used: it is expired, quarantined or recalled. Another person may record an override.',
  ],
  'calibrations.step-order': [
    'conflict',
    'The steps of this procedure are done in their order. The current step is named below.',
  ],
  'calibrations.step-incomplete': ['invalid', 'This step is not complete. What is missing is named below.'],
  'calibrations.wrong-probe': [
    'conflict',
    'This is not the probe of the run: its serial number or settings differ. Stop here and fetch the right one.',
  ],
  'calibrations.key-reused': ['conflict', 'This key was used before with other content. The first is kept.'],
  'calibrations.capture-not-found': ['not-found', 'No such captured reading in this run.'],
  'calibrations.capture-excluded': ['conflict', 'This captured reading is excluded already.'],
  'calibrations.order-of-magnitude': [
    'invalid',
    'The typed value is far from what this solution shows. Check the unit and the decimal point, then confirm it.',
  ],
  'calibrations.adjustment-reason': [
    'invalid',
    'The cell constant would move by more than 3 %, or the guard says to leave it: give the reason.',
  ],
  'calibrations.constant-out-of-bounds': [
    'conflict',
    'The new cell constant would lie more than 10 % from nominal. Do not adjust: inspect or replace the probe.',
  ],
  'calibrations.password-wrong': ['invalid', 'The password is not right. The signature was not made.'],
  'calibrations.own-approval': ['forbidden', 'The person who performed a run never approves it.'],
  'calibrations.not-signed': ['conflict', 'Only a signed run can be reviewed.'],
  'calibrations.open-beaker': [
    'conflict',
    'This solution is too dilute for an open beaker: carbon dioxide of the air changes it meanwhile. Compare in line with a reference cell instead.',
  ],
  'calibrations.review-not-needed': [
    'conflict',
    'This site asks for no review: the run took effect when it was signed.',
  ],
  'calibrations.amended': ['conflict', 'This record is amended already. Amend the newest one.'],
  'calibrations.command-not-open': [
    'conflict',
    'There is no order to the device that could be sent again: none was made, it is waiting, or it is confirmed.',
  ],
  'calibrations.hand-over-impossible': [
    'conflict',
    'A run is handed over to another technician of the same site.',
  ],

  'reference.outside-domain': [
    'invalid',
    'The equation is not known to hold there. The limits are named below.',
  ],
});

export type ErrorCode = keyof typeof errorCodes;

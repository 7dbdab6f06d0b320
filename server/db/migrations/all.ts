/** Every change in order. Imported by name, so that a bundled server carries them along. */
import type { Migration } from './migration.ts';
import { createUsers } from './20261201090000-create-users.ts';
import { createSessions } from './20261201090100-create-sessions.ts';
import { createSites } from './20261201090200-create-sites.ts';
import { createMemberships } from './20261201090300-create-memberships.ts';
import { createPoints } from './20261201090400-create-points.ts';
import { createProbes } from './20261201090500-create-probes.ts';
import { createAssignments } from './20261201090600-create-assignments.ts';
import { createDevices } from './20261201090700-create-devices.ts';
import { createStandards } from './20261201090800-create-standards.ts';
import { createReadings } from './20261201090900-create-readings.ts';
import { createReadingRollups } from './20261201091000-create-reading-rollups.ts';
import { createChecks } from './20261201091100-create-checks.ts';
import { createQuarantinedMessages } from './20261201091200-create-quarantined-messages.ts';
import { createNotices } from './20261201091300-create-notices.ts';
import { createAuditEvents } from './20261201091400-create-audit-events.ts';
import { createSettings } from './20261201091500-create-settings.ts';
import { createMails } from './20261201091600-create-mails.ts';
import { announceDirectoryChanges } from './20261201091700-announce-directory-changes.ts';
import { createProcedures } from './20261208090000-create-procedures.ts';
import { createCertificates } from './20261208090100-create-certificates.ts';
import { createBottles } from './20261208090200-create-bottles.ts';
import { createInstruments } from './20261208090300-create-instruments.ts';
import { createCalibrations } from './20261208090400-create-calibrations.ts';
import { createCalibrationEvidence } from './20261208090500-create-calibration-evidence.ts';
import { createDeviceCommands } from './20261208090600-create-device-commands.ts';
import { createPrompts } from './20261208090700-create-prompts.ts';
import { announceDeviceCommands } from './20261208090800-announce-device-commands.ts';
import { describeLots } from './20261208091000-describe-lots.ts';

export const migrations: readonly Migration[] = [
  createUsers,
  createSessions,
  createSites,
  createMemberships,
  createPoints,
  createProbes,
  createAssignments,
  createDevices,
  createStandards,
  createReadings,
  createReadingRollups,
  createChecks,
  createQuarantinedMessages,
  createNotices,
  createAuditEvents,
  createSettings,
  createMails,
  announceDirectoryChanges,
  createProcedures,
  createCertificates,
  createBottles,
  createInstruments,
  createCalibrations,
  createCalibrationEvidence,
  createDeviceCommands,
  createPrompts,
  announceDeviceCommands,
  describeLots,
];

/** Every model, tied to one connection, and how they relate. The only barrel: the association graph is cyclic. */
import type { Sequelize } from 'sequelize';
import { User, initUser } from './user.ts';
import { PasswordToken, initPasswordToken } from './password-token.ts';
import { Membership, initMembership } from './membership.ts';
import { Session, initSession } from './session.ts';
import { Site, initSite } from './site.ts';
import { Area, initArea } from './area.ts';
import { Point, initPoint } from './point.ts';
import { Hold, initHold } from './hold.ts';
import { Probe, initProbe } from './probe.ts';
import { Assignment, initAssignment } from './assignment.ts';
import { CellConstant, initCellConstant } from './cell-constant.ts';
import { ProbeEvent, initProbeEvent } from './probe-event.ts';
import { Device, initDevice } from './device.ts';
import { DeviceBoot, initDeviceBoot } from './device-boot.ts';
import { DeviceSettings, initDeviceSettings } from './device-settings.ts';
import { Standard, initStandard } from './standard.ts';
import { Reading, initReading } from './reading.ts';
import { ReadingRollup, initReadingRollup } from './reading-rollup.ts';
import { RollupDue, initRollupDue } from './rollup-due.ts';
import { LiveReading, initLiveReading } from './live-reading.ts';
import { Check, initCheck } from './check.ts';
import { QuarantinedMessage, initQuarantinedMessage } from './quarantined-message.ts';
import { Notice, initNotice } from './notice.ts';
import { AuditEvent, initAuditEvent } from './audit-event.ts';
import { Setting, initSetting } from './setting.ts';
import { Mail, initMail } from './mail.ts';
import { Procedure, initProcedure } from './procedure.ts';
import { Certificate, initCertificate } from './certificate.ts';
import { Bottle, initBottle } from './bottle.ts';
import { Instrument, initInstrument } from './instrument.ts';
import { Calibration, initCalibration } from './calibration.ts';
import { CalibrationCounter, initCalibrationCounter } from './calibration-counter.ts';
import { CalibrationStep, initCalibrationStep } from './calibration-step.ts';
import { Capture, initCapture } from './capture.ts';
import { CaptureExclusion, initCaptureExclusion } from './capture-exclusion.ts';
import { Signature, initSignature } from './signature.ts';
import { DeviceCommand, initDeviceCommand } from './device-command.ts';
import { Prompt, initPrompt } from './prompt.ts';

export {
  User,
  PasswordToken,
  Membership,
  Session,
  Site,
  Area,
  Point,
  Hold,
  Probe,
  Assignment,
  CellConstant,
  ProbeEvent,
  Device,
  DeviceBoot,
  DeviceSettings,
  Standard,
  Reading,
  ReadingRollup,
  RollupDue,
  LiveReading,
  Check,
  QuarantinedMessage,
  Notice,
  AuditEvent,
  Setting,
  Mail,
  Procedure,
  Certificate,
  Bottle,
  Instrument,
  Calibration,
  CalibrationCounter,
  CalibrationStep,
  Capture,
  CaptureExclusion,
  Signature,
  DeviceCommand,
  Prompt,
};

const initialisers = [
  initUser,
  initPasswordToken,
  initMembership,
  initSession,
  initSite,
  initArea,
  initPoint,
  initHold,
  initProbe,
  initAssignment,
  initCellConstant,
  initProbeEvent,
  initDevice,
  initDeviceBoot,
  initDeviceSettings,
  initStandard,
  initReading,
  initReadingRollup,
  initRollupDue,
  initLiveReading,
  initCheck,
  initQuarantinedMessage,
  initNotice,
  initAuditEvent,
  initSetting,
  initMail,
  initProcedure,
  initCertificate,
  initBottle,
  initInstrument,
  initCalibration,
  initCalibrationCounter,
  initCalibrationStep,
  initCapture,
  initCaptureExclusion,
  initSignature,
  initDeviceCommand,
  initPrompt,
];

/** Ties all models to `sequelize`, then relates them. */
export function initModels(sequelize: Sequelize): void {
  for (const initialise of initialisers) initialise(sequelize);
  relatePeople();
  relatePlaces();
  relateProbes();
  relateDevices();
  relateChecks();
  relateNotices();
  relateReferences();
  relateCalibrations();
}

function relatePeople(): void {
  User.hasMany(Membership, { as: 'memberships', foreignKey: 'userId' });
  Membership.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Membership.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
  PasswordToken.belongsTo(User, { as: 'user', foreignKey: 'userId' });
}

function relatePlaces(): void {
  Site.hasMany(Area, { as: 'areas', foreignKey: 'siteId' });
  Area.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
  Area.hasMany(Point, { as: 'points', foreignKey: 'areaId' });
  Point.belongsTo(Area, { as: 'area', foreignKey: 'areaId' });
  Point.hasMany(Hold, { as: 'holds', foreignKey: 'pointId' });
  Point.hasMany(Assignment, { as: 'assignments', foreignKey: 'pointId' });
  Hold.belongsTo(Point, { as: 'point', foreignKey: 'pointId' });
  Hold.belongsTo(User, { as: 'user', foreignKey: 'userId' });
}

function relateProbes(): void {
  Probe.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
  Probe.hasMany(Assignment, { as: 'assignments', foreignKey: 'probeId' });
  Probe.hasMany(CellConstant, { as: 'cellConstants', foreignKey: 'probeId' });
  Probe.hasMany(ProbeEvent, { as: 'events', foreignKey: 'probeId' });
  Probe.hasMany(Device, { as: 'devices', foreignKey: 'probeId' });
  Probe.hasMany(Check, { as: 'checks', foreignKey: 'probeId' });
  Probe.hasOne(LiveReading, { as: 'liveReading', foreignKey: 'probeId' });
  Assignment.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  Assignment.belongsTo(Point, { as: 'point', foreignKey: 'pointId' });
  Assignment.belongsTo(User, { as: 'installer', foreignKey: 'installedBy' });
  Assignment.belongsTo(User, { as: 'remover', foreignKey: 'removedBy' });
  CellConstant.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  CellConstant.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  ProbeEvent.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  ProbeEvent.belongsTo(Point, { as: 'point', foreignKey: 'pointId' });
  ProbeEvent.belongsTo(User, { as: 'user', foreignKey: 'userId' });
}

function relateDevices(): void {
  Device.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  Device.hasMany(DeviceBoot, { as: 'boots', foreignKey: 'deviceId' });
  DeviceBoot.belongsTo(Device, { as: 'device', foreignKey: 'deviceId' });
  DeviceSettings.belongsTo(Device, { as: 'device', foreignKey: 'deviceId' });
  LiveReading.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  LiveReading.belongsTo(Device, { as: 'device', foreignKey: 'deviceId' });
}

function relateChecks(): void {
  Standard.hasMany(Check, { as: 'checks', foreignKey: 'standardId' });
  Check.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  Check.belongsTo(Point, { as: 'point', foreignKey: 'pointId' });
  Check.belongsTo(Standard, { as: 'standard', foreignKey: 'standardId' });
  Check.belongsTo(Device, { as: 'device', foreignKey: 'deviceId' });
  Check.belongsTo(User, { as: 'performer', foreignKey: 'performedByUserId' });
}

function relateNotices(): void {
  Notice.belongsTo(Device, { as: 'device', foreignKey: 'deviceId' });
  Notice.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  Notice.belongsTo(User, { as: 'closer', foreignKey: 'closedBy' });
  QuarantinedMessage.belongsTo(User, { as: 'resolver', foreignKey: 'resolvedBy' });
}

function relateReferences(): void {
  Standard.hasMany(Bottle, { as: 'bottles', foreignKey: 'standardId' });
  Bottle.belongsTo(Standard, { as: 'standard', foreignKey: 'standardId' });
  Bottle.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
  Bottle.belongsTo(User, { as: 'opener', foreignKey: 'openedBy' });
  Certificate.belongsTo(User, { as: 'uploader', foreignKey: 'uploadedBy' });
}

function relateCalibrations(): void {
  Calibration.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  Calibration.belongsTo(Point, { as: 'point', foreignKey: 'pointId' });
  Calibration.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
  Calibration.belongsTo(Procedure, { as: 'procedure', foreignKey: 'procedureId' });
  Calibration.belongsTo(Standard, { as: 'standard', foreignKey: 'standardId' });
  Calibration.belongsTo(Bottle, { as: 'bottle', foreignKey: 'bottleId' });
  Calibration.belongsTo(Standard, { as: 'secondStandard', foreignKey: 'secondStandardId' });
  Calibration.belongsTo(Instrument, { as: 'thermometer', foreignKey: 'thermometerId' });
  Calibration.belongsTo(User, { as: 'performer', foreignKey: 'performerId' });
  Calibration.hasMany(CalibrationStep, { as: 'steps', foreignKey: 'calibrationId' });
  Calibration.hasMany(Capture, { as: 'captures', foreignKey: 'calibrationId' });
  Calibration.hasMany(Signature, { as: 'signatures', foreignKey: 'calibrationId' });
  CalibrationStep.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Capture.hasOne(CaptureExclusion, { as: 'exclusion', foreignKey: 'captureId' });
  CaptureExclusion.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  DeviceCommand.belongsTo(Device, { as: 'device', foreignKey: 'deviceId' });
  Prompt.belongsTo(Probe, { as: 'probe', foreignKey: 'probeId' });
  Prompt.belongsTo(Point, { as: 'point', foreignKey: 'pointId' });
  Prompt.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
}

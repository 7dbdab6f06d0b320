import {
  amendCalibration,
  calibration,
  calibrationRecord,
  calibrationRow,
  calibrationsQuery,
  captureReading,
  capturePath,
  excludeCapture,
  finishStep,
  handOver,
  reviewCalibration,
  signCalibration,
  startCalibration,
  stopCalibration,
} from '../../../shared/contracts/calibrations.ts';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentCalibration, presentRecord, presentRow } from './presenter.ts';
import * as calibrations from './service.ts';

/** A deed on one run; it is answered with the run as it is then. */
const deed = { verb: 'post', access: 'session', params: idPath, answer: calibration } as const;

export const calibrationRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/calibrations',
    access: 'session',
    does: 'Lists calibrations, newest first.',
    query: calibrationsQuery,
    answer: listOf(calibrationRow),
    run: async ({ parts, actor, query }) => {
      const { items, ...rest } = await calibrations.listCalibrations(parts, actor, query);
      return { items: items.map(presentRow), ...rest };
    },
  }),
  route({
    verb: 'post',
    path: '/api/calibrations',
    access: 'session',
    does: 'Starts a calibration of an installed probe; the same key starts it once.',
    body: startCalibration,
    answer: calibration,
    status: 201,
    run: async ({ parts, actor, body }) =>
      presentCalibration(await calibrations.startCalibration(parts, actor, body), actor),
  }),
  route({
    verb: 'get',
    path: '/api/calibrations/:id',
    access: 'session',
    does: 'Shows one calibration with its steps, readings and judgement.',
    params: idPath,
    answer: calibration,
    run: async ({ actor, params }) => presentCalibration(await calibrations.readRun(actor, params.id), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/steps',
    does: 'Finishes the current step of a run.',
    body: finishStep,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.finishStep(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/captures',
    does: 'Captures a reading in the current step.',
    body: captureReading,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.captureReading(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/captures/:captureId/exclude',
    params: capturePath,
    does: 'Excludes a captured reading of the current step with a coded reason; it stays visible.',
    body: excludeCapture,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(
        await calibrations.excludeCapture(parts, actor, params.id, params.captureId, body),
        actor,
      ),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/stop',
    does: 'Stops a run for safety; what was recorded stays.',
    body: stopCalibration,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.stopCalibration(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/hand-over',
    does: 'Hands a run over to another person of the site.',
    body: handOver,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.handOver(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/sign',
    does: 'Signs a finished run with the password; it gets its number and record.',
    body: signCalibration,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.signCalibration(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/review',
    does: 'Approves a signed run of another person, or returns it with a reason.',
    body: reviewCalibration,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.reviewCalibration(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/amend',
    does: 'Amends a signed record by one with a number of its own.',
    body: amendCalibration,
    status: 201,
    run: async ({ parts, actor, params, body }) =>
      presentCalibration(await calibrations.amendCalibration(parts, actor, params.id, body), actor),
  }),
  route({
    ...deed,
    path: '/api/calibrations/:id/command',
    does: 'Sends a cell constant that the device has not confirmed once more.',
    run: async ({ parts, actor, params }) =>
      presentCalibration(await calibrations.repeatCommand(parts, actor, params.id), actor),
  }),
  route({
    verb: 'get',
    path: '/api/calibrations/:id/record.json',
    access: 'session',
    does: 'The signed record with its hash and signatures.',
    params: idPath,
    answer: calibrationRecord,
    run: async ({ actor, params }) => presentRecord(await calibrations.readRecord(actor, params.id)),
  }),
];

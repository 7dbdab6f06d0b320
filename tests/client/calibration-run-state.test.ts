import { describe, expect, it } from 'vitest';
import type { Deed, QueuedDeed } from '../../client/src/features/calibrations/offline/deeds.ts';
import {
  confirmedCapture,
  excludeDeed,
  stepDeed,
} from '../../client/src/features/calibrations/offline/deeds.ts';
import {
  capturesOf,
  countingOf,
  runWithDeeds,
  waitingSince,
} from '../../client/src/features/calibrations/offline/run-state.ts';
import { aCapture, aCaptureDeed, aRun, at } from './calibration-runs.ts';

const queued = (...deeds: Deed[]): QueuedDeed[] =>
  deeds.map((deed, i) => ({ order: i + 1, userId: 1, deed, refusal: null }));

const refused = (entry: QueuedDeed, reason: string): QueuedDeed => ({
  ...entry,
  refusal: { code: 'calibrations.step-order', reason, at: at(500) },
});

describe('a run without network', () => {
  it('shows what the server has and what waits on this phone in one list', () => {
    const run = aRun('as-found', [aCapture('k1', 1)]);
    const view = runWithDeeds(run, queued(aCaptureDeed('k2'), aCaptureDeed('k3', 1078.1)));
    expect(capturesOf(view, 'as-found').map(({ position, whereabouts }) => [position, whereabouts])).toEqual([
      [1, 'server'],
      [2, 'phone'],
      [3, 'phone'],
    ]);
    expect(view.waiting).toBe(2);
    expect(view.currentStep).toBe('as-found');
  });

  it('goes on to the next step when its readings and its end only lie on the phone', () => {
    const view = runWithDeeds(
      aRun('as-found', [aCapture('k1', 1), aCapture('k2', 2)]),
      queued(
        aCaptureDeed('k3'),
        stepDeed(7, { step: 'as-found' }, at(410)),
        stepDeed(7, { step: 'clean', agent: 'water', minutes: 5, note: null }, at(700)),
      ),
    );
    expect(view.currentStep).toBe('as-found-cleaned');
    expect(view.steps.filter((one) => one.state === 'done').at(-1)).toMatchObject({
      step: 'clean',
      capturedAt: at(700),
      data: { agent: 'water' },
    });
    expect(waitingSince(view)).toBe(Date.parse(at(700)));
  });

  it('takes a deed once when its answer was lost on the way back', () => {
    const arrived = aRun('clean', [aCapture('k1', 1), aCapture('k2', 2)]);
    const view = runWithDeeds(
      arrived,
      queued(aCaptureDeed('k2'), stepDeed(7, { step: 'as-found' }, at(410))),
    );
    expect(view.captures).toHaveLength(2);
    expect(view.currentStep).toBe('clean');
    expect(view.waiting).toBe(0);
  });

  it('excludes a reading that the server has not even heard of', () => {
    const view = runWithDeeds(
      aRun('as-found', [aCapture('k1', 1)]),
      queued(aCaptureDeed('k2'), excludeDeed(7, 'k2', { code: 'bubble', note: null, capturedAt: at(420) })),
    );
    expect(capturesOf(view, 'as-found').map((one) => one.excluded)).toEqual([
      null,
      { code: 'bubble', note: null },
    ]);
    expect(countingOf(view, 'as-found')).toHaveLength(1);
  });

  it('keeps a refused reading in sight and counts it for nothing', () => {
    const [first, second] = queued(aCaptureDeed('k1'), aCaptureDeed('k2'));
    const view = runWithDeeds(aRun('as-found'), [refused(first!, 'Not in this step.'), second!]);
    expect(capturesOf(view, 'as-found').map((one) => [one.whereabouts, one.refusal?.reason ?? null])).toEqual(
      [
        ['refused', 'Not in this step.'],
        ['phone', null],
      ],
    );
    expect(countingOf(view, 'as-found').map((one) => one.position)).toEqual([1]);
    expect(view).toMatchObject({ waiting: 1, refused: [{ order: 1 }] });
  });

  it('stays at a step whose end was refused', () => {
    const [entry] = queued(stepDeed(7, { step: 'as-found' }, at(410)));
    expect(runWithDeeds(aRun('as-found'), [refused(entry!, 'Not complete.')]).currentStep).toBe('as-found');
  });

  it('ignores the end of a step that is not the current one', () => {
    const view = runWithDeeds(aRun('as-found'), queued(stepDeed(7, { step: 'as-left' }, at(410))));
    expect(view.currentStep).toBe('as-found');
  });

  it('leaves out as left after a decision to leave the probe as it is', () => {
    const leave = stepDeed(7, { step: 'decide', decision: 'leave', reason: null }, at(900));
    const adjust = stepDeed(7, { step: 'decide', decision: 'adjust', reason: null }, at(900));
    expect(runWithDeeds(aRun('decide'), queued(leave)).currentStep).toBe('reinstall');
    expect(runWithDeeds(aRun('decide'), queued(adjust)).currentStep).toBe('as-left');
  });

  it('leaves the deeds of other runs alone', () => {
    const view = runWithDeeds(aRun('as-found'), queued(aCaptureDeed('k9', 1, 8)));
    expect(view).toMatchObject({ waiting: 0, captures: [] });
  });

  it('confirms a typed value as a new deed with the old time', () => {
    const typed = aCaptureDeed('k1', 14_130) as Extract<Deed, { kind: 'capture' }>;
    const again = confirmedCapture(typed);
    expect(again.body).toMatchObject({ conductivityUsCm: 14_130, isConfirmed: true, capturedAt: at(400) });
    expect(again.body.key).not.toBe('k1');
  });
});

import { describe, expect, it } from 'vitest';
import { HttpProblem, NetworkFailure } from '../../client/src/lib/http.ts';
import { narrowOffset, offsetOf } from '../../client/src/features/calibrations/offline/clock-offset.ts';
import type {
  DeedQueue,
  DeedStore,
  SendOutcome,
} from '../../client/src/features/calibrations/offline/deed-queue.ts';
import { createDeedQueue } from '../../client/src/features/calibrations/offline/deed-queue.ts';
import type { Deed, QueuedDeed } from '../../client/src/features/calibrations/offline/deeds.ts';
import { keyOf } from '../../client/src/features/calibrations/offline/deeds.ts';
import { saveWords } from '../../client/src/features/calibrations/offline/save-words.ts';
import { outcomeOf } from '../../client/src/features/calibrations/offline/send-deed.ts';
import { aCaptureDeed, at } from './calibration-runs.ts';

/** What would lie in IndexedDB. */
function memoryStore(rows = new Map<number, QueuedDeed>()): DeedStore & { rows: Map<number, QueuedDeed> } {
  return {
    rows,
    all: () => Promise.resolve([...rows.values()]),
    add: (entry) => {
      const order = Math.max(0, ...rows.keys()) + 1;
      rows.set(order, { ...entry, order });
      return Promise.resolve({ ...entry, order });
    },
    replace: (entry) => {
      rows.set(entry.order, entry);
      return Promise.resolve();
    },
    remove: (order) => {
      rows.delete(order);
      return Promise.resolve();
    },
  };
}

/** A server at the other end of a bad line. */
function aBench(store = memoryStore()) {
  const arrived: string[] = [];
  const pauses: { delayMs: number; callback: () => void }[] = [];
  let told: (() => void) | null = null;
  /** Resolves when the queue pauses next. */
  const paused = () => new Promise<void>((resolve) => (told = resolve));
  const line = { answer: (_deed: Deed): SendOutcome => ({ kind: 'accepted' }) };
  const queue = createDeedQueue({
    store,
    send: (deed) => {
      const outcome = line.answer(deed);
      if (outcome.kind === 'accepted') arrived.push(keyOf(deed));
      return Promise.resolve(outcome);
    },
    now: () => at(900),
    later: (callback, delayMs) => {
      const pause = { delayMs, callback };
      pauses.push(pause);
      told?.();
      return () => void pauses.splice(pauses.indexOf(pause), 1);
    },
  });
  return { queue, store, arrived, pauses, paused, line };
}

/** Resolves when the queue is in the state asked for. */
function until(
  queue: DeedQueue,
  isSo: (snapshot: ReturnType<DeedQueue['snapshot']>) => boolean,
): Promise<void> {
  return new Promise((resolve) => {
    const look = () => {
      if (!isSo(queue.snapshot())) return;
      stop();
      resolve();
    };
    const stop = queue.subscribe(look);
    look();
  });
}

const isEmpty = ({ entries, isRead }: ReturnType<DeedQueue['snapshot']>) => isRead && entries.length === 0;
const unreachable = (): SendOutcome => ({ kind: 'unreachable' });

describe('deeds on the phone', () => {
  it('go up once each, in the order they were done', async () => {
    const { queue, arrived, store } = aBench();
    queue.start(1);
    for (const key of ['a', 'b', 'c']) await queue.add(aCaptureDeed(key));
    await until(queue, isEmpty);
    expect(arrived).toEqual(['a', 'b', 'c']);
    expect(store.rows.size).toBe(0);
    expect(queue.snapshot().lastSentAt).toBe(at(900));
  });

  it('stay through a dead spot and a killed app, and go up when the network is back', async () => {
    const first = aBench();
    first.line.answer = unreachable;
    first.queue.start(1);
    for (const key of ['a', 'b']) await first.queue.add(aCaptureDeed(key));
    expect(first.store.rows.size).toBe(2);
    // Another page, the same phone.
    const second = aBench(first.store);
    second.queue.start(1);
    await until(second.queue, isEmpty);
    expect(second.arrived).toEqual(['a', 'b']);
  });

  it('are tried again with growing pauses, and at once when the network returns', async () => {
    const { queue, pauses, paused, line, arrived } = aBench();
    line.answer = unreachable;
    queue.start(1);
    await until(queue, ({ isRead }) => isRead);
    const first = paused();
    await queue.add(aCaptureDeed('a'));
    await first;
    const seen: number[] = [];
    for (let i = 0; i < 4; i += 1) {
      const { delayMs, callback } = pauses.at(-1)!;
      seen.push(delayMs);
      const next = paused();
      callback();
      await next;
    }
    expect(seen).toEqual([1000, 2000, 4000, 8000]);
    line.answer = () => ({ kind: 'accepted' });
    queue.wake();
    await until(queue, isEmpty);
    expect(arrived).toEqual(['a']);
  });

  it('do not overtake one that cannot be sent', async () => {
    const { queue, line, arrived, paused } = aBench();
    line.answer = (deed) => (keyOf(deed) === 'a' ? { kind: 'unreachable' } : { kind: 'accepted' });
    queue.start(1);
    for (const key of ['a', 'b']) await queue.add(aCaptureDeed(key));
    const again = paused();
    queue.wake();
    await again;
    expect(arrived).toEqual([]);
    expect(queue.snapshot().entries).toHaveLength(2);
  });

  it('stay with the reason when the server does not accept them, and the rest goes on', async () => {
    const { queue, line, arrived, store } = aBench();
    const reason = 'The current step is clean.';
    line.answer = (deed) =>
      keyOf(deed) === 'a'
        ? { kind: 'refused', code: 'calibrations.step-order', reason }
        : { kind: 'accepted' };
    queue.start(1);
    for (const key of ['a', 'b']) await queue.add(aCaptureDeed(key));
    await until(queue, ({ entries }) => entries.length === 1 && entries[0]!.refusal !== null);
    expect(arrived).toEqual(['b']);
    expect([...store.rows.values()]).toMatchObject([
      { refusal: { code: 'calibrations.step-order', reason, at: at(900) } },
    ]);
  });

  it('that were refused go up again when the person says so, or are set aside', async () => {
    const { queue, line, arrived, store } = aBench();
    line.answer = () => ({ kind: 'refused', code: 'calibrations.not-performer', reason: 'Not yours.' });
    queue.start(1);
    for (const key of ['a', 'b']) await queue.add(aCaptureDeed(key));
    await until(queue, ({ entries }) => entries.length === 2 && entries.every((one) => one.refusal !== null));
    await queue.setAside(queue.snapshot().entries[1]!.order);
    line.answer = () => ({ kind: 'accepted' });
    await queue.sendAgain(7);
    await until(queue, isEmpty);
    expect(arrived).toEqual(['a']);
    expect(store.rows.size).toBe(0);
  });

  it('never go up under another person’s session', async () => {
    const first = aBench();
    first.line.answer = () => ({ kind: 'signed-out' });
    const stop = first.queue.start(1);
    await first.queue.add(aCaptureDeed('a'));
    await until(first.queue, ({ isSignedOut }) => isSignedOut);
    stop();
    first.line.answer = () => ({ kind: 'accepted' });
    first.queue.start(2);
    await first.queue.add(aCaptureDeed('b'));
    await until(first.queue, ({ entries }) => entries.length === 1);
    expect(first.arrived).toEqual(['b']);
    first.queue.start(1);
    await until(first.queue, isEmpty);
    expect(first.arrived).toEqual(['b', 'a']);
  });

  it('are refused while nobody is signed in', async () => {
    await expect(aBench().queue.add(aCaptureDeed('a'))).rejects.toThrow('Nobody is signed in');
  });
});

describe('an attempt to send', () => {
  it('tells a dead line and a server in trouble from a refusal', () => {
    expect(outcomeOf(new NetworkFailure(null))).toEqual({ kind: 'unreachable' });
    expect(outcomeOf(new HttpProblem(503, { code: 'request.unavailable' }))).toEqual({ kind: 'unreachable' });
    expect(outcomeOf(new HttpProblem(401, { code: 'sessions.required' }))).toEqual({ kind: 'signed-out' });
    const refusal = new HttpProblem(422, {
      code: 'calibrations.step-incomplete',
      title: 'This step is not complete.',
      issues: [{ path: 'captures', message: '3 captured readings are needed; 2 count so far.' }],
    });
    expect(outcomeOf(refusal)).toEqual({
      kind: 'refused',
      code: 'calibrations.step-incomplete',
      reason: 'This step is not complete. 3 captured readings are needed; 2 count so far.',
    });
  });
});

describe('the line above the button', () => {
  const facts = {
    waiting: 0,
    refused: 0,
    lastSentAt: null,
    isSignedOut: false,
    isOnline: true,
    timeZone: 'UTC',
  };
  it.each([
    [{}, 'Everything is on the server'],
    [{ lastSentAt: '2026-12-01T13:20:00.000Z' }, 'Saved on this phone and sent at 13:20'],
    [{ waiting: 3 }, 'Saved on this phone, 3 not yet sent'],
    [{ waiting: 3, isOnline: false }, 'Saved on this phone, 3 not yet sent'],
    [{ waiting: 2, isSignedOut: true }, 'Saved on this phone, 2 not yet sent: sign in again.'],
    [{ refused: 1 }, 'Saved on this phone. 1 not accepted, see above.'],
    [{ isOnline: false }, 'No network. What you capture is saved on this phone.'],
  ])('%j reads “%s”', (change, words) => {
    expect(saveWords({ ...facts, ...change })).toBe(words);
  });
});

describe('the clock of the phone against the server', () => {
  /** An answer that took 40 ms each way, of a server whose header is cut to the second. */
  const sample = (trueServerMs: number, offsetMs: number) => ({
    serverMs: Math.floor(trueServerMs / 1000) * 1000,
    sentMs: trueServerMs + offsetMs - 40,
    receivedMs: trueServerMs + offsetMs + 40,
  });

  it('is known to a fraction of a second after a few answers', () => {
    const seconds = [10_050, 11_400, 12_720, 13_990];
    const bounds = seconds.reduce(
      (known, ms) => narrowOffset(known, sample(ms, 4200)),
      null as ReturnType<typeof narrowOffset> | null,
    );
    expect(Math.abs(offsetOf(bounds)! - 4200)).toBeLessThan(100);
    expect(bounds!.highMs - bounds!.lowMs).toBeLessThan(200);
  });

  it('begins anew when one of the clocks was set in between', () => {
    const before = narrowOffset(null, sample(10_050, 4200));
    const after = narrowOffset(before, sample(20_500, -60_000));
    expect(Math.abs(offsetOf(after)! + 60_000)).toBeLessThan(600);
  });

  it('is unknown before the first answer', () => {
    expect(offsetOf(null)).toBeNull();
  });
});

/**
 * Starts children, watches them, and ends exactly those. Children get a process group of their own, so that Ctrl-C
 * reaches only this process, which then stops them one by one in a sensible order.
 */
import { spawn } from 'node:child_process';
import { closeSync, openSync } from 'node:fs';
import { join, relative } from 'node:path';
import { lastLines, run } from './commands.mjs';
import { diskFullRefusal } from './disk-space.mjs';
import { logsFolder, root } from './paths.mjs';
import { endProcess, identify, signal } from './processes.mjs';
import { Refusal, say, tellFailure } from './say.mjs';

/** npm passes a terminal's Ctrl-C on to us a second time: only a later one is a second press. */
const SECOND_PRESS_AFTER_MS = 700;
const STOP_TIMEOUT_MS = 15_000;

/** The server first, so that nothing it has taken in is lost; the database after all who use it. */
export const stopOrder = { server: 1, beside: 2, database: 3, lock: 4 };

/** Thrown inside the work when a stop was asked for meanwhile. */
class Stopped extends Error {}

function createSupervisor() {
  /** `{ order, stop, force }`: the lowest order is stopped first. */
  const stops = [];
  const inOrder = () => [...stops].sort((a, b) => a.order - b.order);
  const brief = new Set();
  let lock;
  let stopRequested = false;
  let announceEnd;
  let announceFailure;
  const ended = new Promise((resolve, reject) => {
    announceEnd = resolve;
    announceFailure = reject;
  });
  ended.catch(() => {});

  function endedTooSoon(title, log, code, signalName) {
    if (stopRequested) return;
    const how = signalName ? `was ended by ${signalName}` : `stopped with code ${code}`;
    const wayOut = `Its full log is ${relative(root, log)}. Everything else that was started has been stopped.`;
    const details = lastLines(log);
    const isDiskFull = /ENOSPC|No space left on device/i.test(details.join('\n'));
    announceFailure(
      isDiskFull ? diskFullRefusal(root) : new Refusal(`${title} ${how}.`, wayOut, { details }),
    );
  }

  return {
    ended,
    get stopRequested() {
      return stopRequested;
    },
    useLock(taken) {
      lock = taken;
      stops.push({ order: stopOrder.lock, stop: async () => taken.release(), force: () => taken.release() });
    },
    /** Throws when a stop was asked for: call it between two steps. */
    check() {
      if (stopRequested) throw new Stopped();
    },
    requestStop() {
      stopRequested = true;
      for (const child of brief) signal(-child.pid, 'SIGTERM');
      announceEnd();
    },
    /** For `run`: a command that ends by itself, and is ended with us. */
    onStart(child) {
      if (child.pid === undefined) return;
      brief.add(child);
      child.once('exit', () => brief.delete(child));
    },
    /** Runs one of our own commands to its end; a failure becomes a Refusal with `failure` as its sentence. */
    async run(args, { failure, wayOut, log, env }) {
      const onStart = (child) => this.onStart(child);
      const code = await run(process.execPath, args, { env, log, onStart, detached: true });
      this.check();
      if (code === 0) return;
      throw new Refusal(failure, wayOut, { details: log ? lastLines(log) : [] });
    },
    /** Anything else that must be stopped with us, such as the database cluster. */
    adopt({ title, log, exited, stop, pid, order = stopOrder.database, forceSignal = 'SIGKILL' }) {
      stops.push({ order, stop, force: () => signal(pid, forceSignal) });
      exited?.then((code) => endedTooSoon(title, log, code));
    },
    /** Starts a child that runs until we stop it. */
    start({ name, title, args, env, order = stopOrder.server, echo = false }) {
      const log = join(logsFolder, `${name}.log`);
      const output = openSync(log, 'w');
      const stdio = echo ? ['ignore', 'inherit', 'inherit'] : ['ignore', output, output];
      const child = spawn(process.execPath, args, { cwd: root, env, detached: true, stdio });
      closeSync(output);
      child.once('error', (error) => announceFailure(error));
      if (child.pid === undefined) return;
      lock?.addChild(child.pid);
      const known = identify(child.pid);
      child.once('exit', (code, signalName) => endedTooSoon(title, log, code, signalName));
      const endGroup = () => signal(-known.pid, 'SIGKILL');
      const stop = async () => {
        await endProcess(known, { timeoutMs: STOP_TIMEOUT_MS });
        endGroup();
      };
      stops.push({ order, stop, force: endGroup });
    },
    async stopAll() {
      stopRequested = true;
      for (const { stop } of inOrder()) {
        try {
          await stop();
        } catch (error) {
          tellFailure(error);
        }
      }
    },
    force() {
      for (const child of brief) signal(-child.pid, 'SIGKILL');
      for (const { force } of inOrder()) force();
    },
  };
}

/**
 * Runs `work(supervisor)`, then waits until a stop is asked for or a child ends by itself, then stops everything.
 * With `untilDone`, it stops everything as soon as the work is done, and answers the work's exit code.
 */
export async function supervise(work, { untilDone = false } = {}) {
  const supervisor = createSupervisor();
  let firstPress;
  const onSignal = () => {
    if (firstPress === undefined) {
      firstPress = Date.now();
      say('\nStopping …');
      supervisor.requestStop();
    } else if (Date.now() - firstPress > SECOND_PRESS_AFTER_MS) {
      supervisor.force();
      process.exit(130);
    }
  };
  for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(name, onSignal);

  let failure;
  let code = 0;
  try {
    code = await work(supervisor);
    if (!untilDone) await supervisor.ended;
  } catch (error) {
    // What fails because it was stopped is not a failure.
    if (!supervisor.stopRequested) failure = error;
  }
  const wasAsked = firstPress !== undefined;
  await supervisor.stopAll();
  if (failure) throw failure;
  if (wasAsked) say('Everything that was started has been stopped.');
  return wasAsked && untilDone ? 130 : (code ?? 0);
}

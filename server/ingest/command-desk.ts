/**
 * Carries orders that the database holds to their devices. A reply alone confirms nothing: the device has to announce
 * the value itself. Silence, a refusal and another value end the order as failed, with words for the person.
 */
import { setTimeout as pause } from 'node:timers/promises';
import {
  closeAbandonedCommands,
  isSameConstant,
  reportedCellConstant,
  settleCommand,
  takeCommands,
  type TakenCommand,
} from '../features/calibrations/service.ts';
import { AppError } from '../errors.ts';
import type { Parts } from '../parts.ts';
import type { Commands } from './commands.ts';
import { listenForChanges } from './directory-listener.ts';

/** A device publishes its birth right after it has answered. */
const announceWithinMs = 20_000;
const lookEveryMs = 200;

interface Ending {
  isConfirmed: boolean;
  detail: string;
}

export interface CommandDesk {
  /** Ends the waiting; to be called after the commands were stopped. */
  stop: () => Promise<void>;
}

export async function openCommandDesk(parts: Parts, commands: Pick<Commands, 'send'>): Promise<CommandDesk> {
  const stopping = new AbortController();
  const running = new Set<Promise<void>>();
  const complain = (error: unknown): void =>
    parts.log.warn({ err: error }, 'an order could not be carried out');

  const deliver = async (command: TakenCommand): Promise<void> => {
    const ending = await carryOut(commands, command, stopping.signal);
    await settleCommand(parts, command, ending);
  };
  const track = (work: Promise<void>): void => {
    const tracked = work.catch(complain).finally(() => running.delete(tracked));
    running.add(tracked);
  };
  const sendWaiting = async (): Promise<void> => {
    for (const command of await takeCommands(parts)) track(deliver(command));
  };
  const listener = await listenForChanges({
    url: parts.config.databaseUrl,
    log: parts.log,
    onChange: (what) => {
      if (what === 'device_commands') track(sendWaiting());
    },
    onGap: () => track(sendWaiting()),
  });
  await closeAbandonedCommands(parts);
  track(sendWaiting());

  return {
    stop: async () => {
      stopping.abort();
      await listener.stop();
      await Promise.all(running);
    },
  };
}

async function carryOut(
  commands: Pick<Commands, 'send'>,
  command: TakenCommand,
  signal: AbortSignal,
): Promise<Ending> {
  try {
    const reply = await commands.send(command.deviceName, {
      do: 'apply-cell-constant',
      cell_constant_per_cm: command.cellConstantPerCm,
    });
    const said = reply.text ?? 'no words';
    if (!reply.done) return { isConfirmed: false, detail: `The device refused: ${said}` };
    return await waitForAnnouncement(command, said, signal);
  } catch (error) {
    if (error instanceof AppError) return { isConfirmed: false, detail: error.detail ?? error.message };
    throw error;
  }
}

async function waitForAnnouncement(
  command: TakenCommand,
  said: string,
  signal: AbortSignal,
): Promise<Ending> {
  let reported: number | null = null;
  for (let waitedMs = 0; waitedMs < announceWithinMs && !signal.aborted; waitedMs += lookEveryMs) {
    reported = await reportedCellConstant(command.deviceId);
    if (reported !== null && isSameConstant(reported, command.cellConstantPerCm))
      return { isConfirmed: true, detail: said };
    await pause(lookEveryMs, undefined, { signal }).catch(() => {});
  }
  return {
    isConfirmed: false,
    detail: `The device answered “${said}” but announces ${reported ?? 'no value'}, not ${command.cellConstantPerCm} cm⁻¹.`,
  };
}

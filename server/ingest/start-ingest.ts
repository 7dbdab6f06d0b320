/** Starts the pipeline in reading order: directory, store, intake, broker; and stops it so that nothing acknowledged is lost. */
import { openPool } from '../lib/pool.ts';
import type { Parts } from '../parts.ts';
import { createAnnouncements } from './announcements.ts';
import { openBroker } from './broker.ts';
import { openCommandDesk } from './command-desk.ts';
import { createCommands, type CommandLine, type Commands } from './commands.ts';
import { recordDeviceActivity } from './device-activity.ts';
import { DeviceDirectory } from './device-directory.ts';
import { createIntake, type Intake } from './intake.ts';
import { joinOutsideBroker, type OutsideBroker } from './outside-broker.ts';
import { sweepSilent } from './silent-sweep.ts';
import { openStore } from './store.ts';
import { watchTakeovers } from './takeovers.ts';

export interface Ingest {
  commands: Commands;
  /** Where devices connect, with the port really taken. */
  brokerUrl: string;
  /** Reads one device again at once; otherwise a change is heard from the database within milliseconds. */
  refreshDevice: (name: string) => Promise<void>;
  waiting: Intake['waiting'];
  stop: () => Promise<void>;
}

export interface IngestLimits {
  /** Readings committed together at most. */
  maxGroupWeight?: number;
  /** Bytes held unacknowledged at most, over all devices. */
  maxWaitingBytes?: number;
  /** Between two looks for devices that are gone without a word. */
  sweepMs?: number;
}

/** The lane, the once-a-second notes, and look-ups at sign-in. */
const poolSize = 4;

export async function startIngest(parts: Parts, limits: IngestLimits = {}): Promise<Ingest> {
  const { config, log } = parts;
  const nowMs = (): number => parts.clock.now().getTime();
  const pool = openPool(
    {
      connectionString: config.databaseUrl,
      max: poolSize,
      application_name: 'saltmark ingest',
      keepAlive: true,
    },
    (error) => log.warn({ err: error }, 'a database connection of ingest ended'),
  );

  const directory = await DeviceDirectory.open({ pool, url: config.databaseUrl, log, nowMs });
  const activity = recordDeviceActivity(pool, log);
  const announcements = createAnnouncements(parts.broadcast);
  const line = createLine();
  const commands = createCommands(line, nowMs, (error) =>
    log.warn({ err: error }, 'a command could not be sent'),
  );
  const isShared = config.outsideBrokerUrl !== undefined;
  const store = await openStore({ parts, pool, directory, activity, announcements, commands, isShared });
  const intake = createIntake(store, log, limits);
  const takeovers = watchTakeovers({ pool, announcements, log, nowMs });
  const front = config.outsideBrokerUrl
    ? await outsideFront(parts, config.outsideBrokerUrl, intake)
    : await embeddedFront({ parts, directory, intake, takeovers }, limits.sweepMs);
  line.connect(front.line);
  const desk = await openCommandDesk(parts, commands);
  parts.health.push({
    name: 'broker',
    check: async () => {
      if (intake.isHolding())
        return { up: false, detail: 'The database does not take readings; devices keep them.' };
      return front.health();
    },
  });

  return {
    commands,
    brokerUrl: front.url,
    refreshDevice: (name) => directory.refreshDevice(name),
    waiting: intake.waiting,
    stop: async () => {
      await front.close();
      commands.stop();
      await desk.stop();
      await intake.stop();
      await front.end();
      announcements.stop();
      await activity.stop();
      await directory.stop();
      await pool.end();
    },
  };
}

/** The pipeline needs the way out for commands before the broker, which needs the pipeline, is there. */
function createLine(): CommandLine & { connect: (to: CommandLine) => void } {
  let line: CommandLine | null = null;
  return {
    reaches: (name) => line?.reaches(name) ?? false,
    publish: async (topic, payload) => {
      await line?.publish(topic, payload);
    },
    connect: (to) => {
      line = to;
    },
  };
}

interface Front {
  url: string;
  line: CommandLine;
  health: () => { up: boolean; detail?: string };
  /** Takes nothing new. */
  close: () => Promise<void>;
  end: () => Promise<void>;
}

async function embeddedFront(
  needs: Parameters<typeof openBroker>[0],
  everyMs: number | undefined,
): Promise<Front> {
  const broker = await openBroker(needs);
  const sweep = sweepSilent({ ...needs, isConnected: broker.isConnected, everyMs });
  return {
    url: broker.url,
    line: broker.line,
    health: () => ({ up: true, detail: broker.url }),
    close: async () => {
      sweep.stop();
      await broker.close();
    },
    end: broker.end,
  };
}

async function outsideFront(parts: Parts, url: string, intake: Intake): Promise<Front> {
  const broker: OutsideBroker = await joinOutsideBroker({ parts, url, intake });
  return {
    url,
    line: broker.line,
    health: () => {
      const count = broker.connectedCount();
      return { up: count > 0, detail: `${count} connections to the outside broker` };
    },
    close: async () => {},
    end: broker.close,
  };
}

import { existsSync, readFileSync } from 'node:fs';
import { help, readCommandLine, type RunOptions } from './command-line.ts';
import { askControl, openControl } from './control.ts';
import { Fleet } from './fleet.ts';
import type { FleetFile } from './scenario/fleet-file.ts';

const REPORT_EVERY_MS = 60_000;
/** A broker that no longer answers must not keep the process alive. */
const GOODBYE_MS = 5000;

function readFleetFile(path: string): FleetFile {
  if (!existsSync(path)) {
    throw new Error(
      `There is no credentials file ${path}. Load the demo (npm start does it), or issue device credentials and name the file with --credentials.`,
    );
  }
  const file = JSON.parse(readFileSync(path, 'utf8')) as Partial<FleetFile>;
  if (!Array.isArray(file.devices) || file.devices.some((one) => !one.device || !one.secret)) {
    throw new Error(`${path} must hold {"devices":[{"device":"…","secret":"…"}]}.`);
  }
  return { ...file, devices: file.devices };
}

async function run(options: RunOptions): Promise<void> {
  const file = readFleetFile(options.credentialsPath);
  const say = (line: string) => console.log(`simulator: ${line}`);
  const fleet = new Fleet({ ...options, file, seed: options.seed ?? file.seed ?? 1, report: say });
  const control = await openControl(options.controlPath, (deed) => fleet.perform(deed));
  fleet.start();
  const status = () =>
    `${fleet.connected} of ${fleet.size} probes connected to ${options.url}, ${fleet.counts.readingsAcknowledged} readings acknowledged`;
  say(
    `${fleet.size} probes start towards ${options.url}; "npm run simulate -- --help" shows what can be asked of them`,
  );
  if (!options.isQuiet) fleet.ticker.every(REPORT_EVERY_MS, () => say(status()), 5000);
  let isStopping = false;
  const stop = async () => {
    if (isStopping) return;
    isStopping = true;
    control.close();
    setTimeout(() => process.exit(0), GOODBYE_MS).unref();
    await fleet.stop();
    process.exit(0);
  };
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => void stop());
}

async function main(): Promise<void> {
  const request = readCommandLine(process.argv.slice(2));
  if (request.kind === 'help') console.log(help);
  else if (request.kind === 'run') await run(request.options);
  else {
    const answer = await askControl(request.controlPath, request.deed);
    console.log(answer.text);
    if (!answer.isDone) process.exitCode = 1;
  }
}

// A reader that has seen enough ("list | head") closes the pipe; that is no failure.
process.stdout.on('error', () => process.exit());

try {
  await main();
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
}

import { parseArgs } from 'node:util';
import { standardBases, type StandardBasis } from '../shared/contracts/vocabulary.ts';
import type { ReferenceSolution } from './bench.ts';
import { faultKinds, type FaultKind } from './faults.ts';
import type { Deed } from './fleet.ts';

export const defaultControlPath = '.data/simulator.sock';
export const defaultCredentialsPath = '.data/simulator.json';
export const defaultStatePath = '.data/simulator-state.json';

const faultLines = Object.entries(faultKinds).map(([kind, text]) => `    ${kind.padEnd(12)} ${text}`);

export const help = `Imaginary conductivity probes on the real MQTT contract.

Run a fleet
  npm run simulate -- [options]
    --credentials FILE  devices and their passwords, JSON {"devices":[{"device","secret","profile"?,"state"?}],
                        "solutions"?:[…],"seed"?}   (default ${defaultCredentialsPath})
    --url URL           broker                      (default mqtt://127.0.0.1:4283)
    --probes N          only the first N devices    (default all)
    --rate R            readings a second per probe (default each probe's own interval)
    --speed S           the physical world runs S times faster than the clock (default 1)
    --seed N            another fate for every probe (default the file's, else 1)
    --state FILE        what devices keep over a restart; "none" forgets (default ${defaultStatePath})
    --unmarked          leave out the flag "simulated" on readings
    --quiet             say only what goes wrong
    --control PATH      local socket for the commands below (default ${defaultControlPath})

Ask a running fleet (device: its name, its serial number, or a part that fits only one)
  npm run simulate -- list
  npm run simulate -- fault <device> <kind> --minutes 10
${faultLines.join('\n')}
  npm run simulate -- heal <device>              ends every fault at once
  npm run simulate -- bench <device> --solution <lot code> --temperature 24.8 [--context calibration|check]
                      puts the probe into a bottle; it settles as a real one does. For a solution that is no lot
                      of the demo add --basis molal|demal|molar --nominal 0.01|0.1|1, or --value-25 <µS/cm> with
                      --basis other (2 %/K assumed)
  npm run simulate -- air <device>               holds it dry in air, for the zero
  npm run simulate -- check <device> [--solution <lot code>]   an automatic check in the flow cell, now
  npm run simulate -- clean <device>             takes the deposit off
  npm run simulate -- process <device>           back into the process water
  npm run simulate -- cell-constant <device> --value 0.1120    somebody changes it at the keypad, without a record
`;

export interface RunOptions {
  credentialsPath: string;
  url: string;
  probes: number | undefined;
  rate: number | undefined;
  speed: number;
  seed: number | undefined;
  statePath: string | null;
  isMarked: boolean;
  isQuiet: boolean;
  controlPath: string;
}

export type Request =
  { kind: 'help' } | { kind: 'run'; options: RunOptions } | { kind: 'ask'; deed: Deed; controlPath: string };

const optionShapes = {
  help: { type: 'boolean', short: 'h' },
  credentials: { type: 'string' },
  url: { type: 'string' },
  probes: { type: 'string' },
  rate: { type: 'string' },
  speed: { type: 'string' },
  seed: { type: 'string' },
  state: { type: 'string' },
  unmarked: { type: 'boolean' },
  quiet: { type: 'boolean' },
  control: { type: 'string' },
  minutes: { type: 'string' },
  solution: { type: 'string' },
  basis: { type: 'string' },
  nominal: { type: 'string' },
  temperature: { type: 'string' },
  context: { type: 'string' },
  value: { type: 'string' },
  'value-25': { type: 'string' },
} as const;

type Values = ReturnType<typeof parseArgs<{ options: typeof optionShapes }>>['values'];

function numberOf(
  values: Values,
  name: keyof Values & string,
  limits: { min: number; max: number },
): number | undefined {
  const text = values[name];
  if (text === undefined) return undefined;
  const value = Number(text);
  if (!Number.isFinite(value) || value < limits.min || value > limits.max) {
    throw new Error(`--${name} must be a number from ${limits.min} to ${limits.max}, not "${String(text)}".`);
  }
  return value;
}

function runOptions(values: Values): RunOptions {
  return {
    credentialsPath: values.credentials ?? defaultCredentialsPath,
    url: values.url ?? 'mqtt://127.0.0.1:4283',
    probes: numberOf(values, 'probes', { min: 1, max: 100_000 }),
    rate: numberOf(values, 'rate', { min: 0.0001, max: 1000 }),
    speed: numberOf(values, 'speed', { min: 0.001, max: 1e6 }) ?? 1,
    seed: numberOf(values, 'seed', { min: 0, max: 2 ** 31 - 1 }),
    statePath: values.state === 'none' ? null : (values.state ?? defaultStatePath),
    isMarked: !values.unmarked,
    isQuiet: values.quiet ?? false,
    controlPath: values.control ?? defaultControlPath,
  };
}

function solutionOf(values: Values): ReferenceSolution | string {
  const code = values.solution;
  if (!code) throw new Error('bench needs --solution <lot code>, for instance --solution KC-26-031.');
  if (!values.basis) return code;
  const basis = values.basis as StandardBasis;
  if (!standardBases.includes(basis))
    throw new Error(`--basis is one of ${standardBases.join(', ')}, not "${values.basis}".`);
  if (basis === 'other') return otherSolution(code, numberOf(values, 'value-25', { min: 1, max: 500_000 }));
  const nominal = numberOf(values, 'nominal', { min: 0.01, max: 1 });
  if (nominal !== 0.01 && nominal !== 0.1 && nominal !== 1)
    throw new Error(`--nominal is 0.01, 0.1 or 1, not "${values.nominal ?? ''}".`);
  return { code, basis, nominal, certified25UsCm: null, table: null, deviation: 0 };
}

function otherSolution(code: string, value25: number | undefined): ReferenceSolution {
  if (value25 === undefined) throw new Error('--basis other needs --value-25 <µS/cm at 25 °C>.');
  const table = [0, 25, 45].map((temperatureC) => ({
    temperatureC,
    conductivityUsCm: value25 * (1 + 0.02 * (temperatureC - 25)),
  }));
  return { code, basis: 'other', nominal: null, certified25UsCm: value25, table, deviation: 0 };
}

function faultDeed(device: string, kind: string | undefined, values: Values): Deed {
  if (!kind || !Object.hasOwn(faultKinds, kind))
    throw new Error(`fault needs a kind: ${Object.keys(faultKinds).join(', ')}.`);
  return {
    do: 'fault',
    device,
    fault: kind as FaultKind,
    minutes: numberOf(values, 'minutes', { min: 0.01, max: 10_080 }) ?? 10,
  };
}

function benchDeed(device: string, values: Values): Deed {
  const context = values.context ?? 'calibration';
  if (context !== 'check' && context !== 'calibration')
    throw new Error(`--context is check or calibration, not "${context}".`);
  return {
    do: 'bench',
    device,
    context,
    solution: solutionOf(values),
    temperatureC: numberOf(values, 'temperature', { min: 0, max: 50 }),
  };
}

function deedOf(positionals: string[], values: Values): Deed {
  const [what, device, kind] = positionals;
  if (what === 'list') return { do: 'list' };
  if (!device)
    throw new Error(
      `"${what}" needs a device: npm run simulate -- ${what} <device>. --help shows all commands.`,
    );
  switch (what) {
    case 'fault':
      return faultDeed(device, kind, values);
    case 'bench':
      return benchDeed(device, values);
    case 'check':
      return { do: 'check', device, solution: values.solution };
    case 'cell-constant': {
      const perCm = numberOf(values, 'value', { min: 0.0001, max: 100 });
      if (perCm === undefined) throw new Error('cell-constant needs --value <cm⁻¹>.');
      return { do: 'cell-constant', device, perCm };
    }
    case 'heal':
    case 'air':
    case 'clean':
    case 'process':
      return { do: what, device };
    default:
      throw new Error(`"${what}" is no command of the simulator. --help shows all.`);
  }
}

export function readCommandLine(args: string[]): Request {
  const { values, positionals } = parseArgs({ args, options: optionShapes, allowPositionals: true });
  if (values.help) return { kind: 'help' };
  if (positionals.length === 0) return { kind: 'run', options: runOptions(values) };
  return {
    kind: 'ask',
    deed: deedOf(positionals, values),
    controlPath: values.control ?? defaultControlPath,
  };
}

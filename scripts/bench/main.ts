/**
 * Measures ingest and live updates on this machine, in one run, so that the figures can be compared with each other:
 * the broker alone, the shortest durable path, and the product. Load and servers share the processors.
 */
import { cpus } from 'node:os';
import pg from 'pg';
import { openPage } from './browser.ts';
import { measureCheckEvaluation } from './check-evaluation.ts';
import { printTable, summarise, type Latencies, type Row } from './figures.ts';
import {
  connectDevices,
  disconnect,
  measureLatency,
  measureThroughput,
  pause,
  warmUpMs,
  type BenchDevice,
} from './load.ts';
import { layPlant } from './plant.ts';
import { startBare, startProduct, type Program } from './programs.ts';

interface Addresses {
  appUrl: string;
  ownerUrl: string;
  bareOwnerUrl: string;
}

const told = process.env.SALTMARK_BENCH;
if (!told)
  throw new Error('Run the benchmark with `npm run bench`: it needs the database that this command starts.');
const addresses = JSON.parse(told) as Addresses;

const seconds = Number(process.argv[2] ?? 8);
const busyDevices = 50;
const window = 20;
const steadyDevices = 1000;
const steadyPerSecond = 2000;

const rows: Row[] = [];
const report = (row: Row): void => {
  rows.push(row);
  console.log(
    `  ${row.what}: ${row.perSecond === null ? '' : `${Math.round(row.perSecond)} /s `}${row.note}`,
  );
};
const steady = `${steadyPerSecond} readings/s from ${steadyDevices} devices`;
const { names, siteId } = await layPlant(addresses.ownerUrl, steadyDevices);

async function withProgram(program: Program, work: () => Promise<void>): Promise<void> {
  try {
    await work();
  } finally {
    await program.stop();
  }
}

async function throughput(program: Program, what: string, readingsPerMessage: number): Promise<void> {
  const devices = await connectDevices(program.mqttUrl, names.slice(0, busyDevices));
  const before = program.coreSeconds();
  const { perSecond, total } = await measureThroughput({ devices, window, seconds, readingsPerMessage });
  const coreUs = ((program.coreSeconds() - before) * 1e6) / total;
  const each = readingsPerMessage === 1 ? '' : `, ${readingsPerMessage} readings a message`;
  report({
    what,
    perSecond,
    latencies: null,
    coreUs,
    note: `${busyDevices} devices, ${window} messages each on the way${each}`,
  });
  await disconnect(devices);
}

async function latency(program: Program, what: string): Promise<void> {
  const devices = await connectDevices(program.mqttUrl, names);
  const before = program.coreSeconds();
  const latencies = await measureLatency({ devices, perSecond: steadyPerSecond, seconds });
  const coreUs = ((program.coreSeconds() - before) * 1e6) / (steadyPerSecond * (seconds + warmUpMs / 1000));
  report({
    what: `${what}, publish → acknowledgement`,
    perSecond: latencies.offeredPerSecond,
    latencies,
    coreUs,
    note: steady,
  });
  await disconnect(devices);
}

async function toBrowser(program: Program): Promise<void> {
  const warmUpReadings = (steadyPerSecond * warmUpMs) / 1000;
  const sentAt = new Map<number, number>();
  const samples: number[] = [];
  const page = await openPage(program.httpUrl, siteId, ({ points }) => {
    const now = performance.now();
    for (const { conductivityUsCm } of points) {
      const at = sentAt.get(conductivityUsCm ?? NaN);
      if (at !== undefined) samples.push(now - at);
    }
  });
  const devices: BenchDevice[] = await connectDevices(program.mqttUrl, names);
  const latencies = await measureLatency({
    devices,
    perSecond: steadyPerSecond,
    seconds,
    conductivityFor: (index) => {
      const conductivityUsCm = 1000 + index / 1000;
      if (index >= warmUpReadings) sentAt.set(conductivityUsCm, performance.now());
      return conductivityUsCm;
    },
  });
  await pause(500);
  const seen: Latencies = summarise(samples);
  const share = ((100 * samples.length) / sentAt.size).toFixed(1);
  report({
    what: 'product, publish → browser event',
    perSecond: latencies.offeredPerSecond,
    latencies: seen,
    coreUs: null,
    note: `${steady}; ${share} % seen by one page`,
  });
  page.close();
  await disconnect(devices);
}

async function countStored(): Promise<number> {
  const client = new pg.Client({ connectionString: addresses.ownerUrl });
  await client.connect();
  const { rows: counted } = await client.query<{ count: string }>('select count(*) as count from readings');
  await client.end();
  return Number(counted[0]?.count);
}

const bareBroker = await startBare('broker', addresses.bareOwnerUrl);
await withProgram(bareBroker, async () => {
  await throughput(bareBroker, 'bare broker, acknowledgements', 1);
  await latency(bareBroker, 'bare broker');
});
const bareDurable = await startBare('durable', addresses.bareOwnerUrl);
await withProgram(bareDurable, async () => {
  await throughput(bareDurable, 'bare grouped commits, rows', 1);
  await latency(bareDurable, 'bare grouped commits');
});
const product = await startProduct(addresses.appUrl);
await withProgram(product, async () => {
  await throughput(product, 'product, durable readings', 1);
  await throughput(product, 'product, durable readings', 10);
  await latency(product, 'product');
  await toBrowser(product);
});
const evaluationUs = measureCheckEvaluation();
report({
  what: 'check evaluation',
  perSecond: 1e6 / evaluationUs,
  latencies: null,
  coreUs: evaluationUs,
  note: `${evaluationUs.toFixed(1)} µs each, one core`,
});

console.log(
  `\n${cpus().length} processors (${cpus()[0]?.model ?? 'unknown'}), Node ${process.version}, ${await countStored()} readings stored`,
);
printTable(rows);

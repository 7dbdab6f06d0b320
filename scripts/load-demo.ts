/** Loads the Corrie Sound Utilities scenario into an empty, migrated database, and writes the simulator's credentials. */
import { mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { connectDatabase } from '../server/db/sequelize.ts';
import { Setting, User } from '../server/db/models/index.ts';
import { demoSeed, scenarioHistory } from '../simulator/scenario/history.ts';
import { loadBottles } from './demo/bottles.ts';
import { loadChecks } from './demo/checks.ts';
import { loadInstruments } from './demo/instruments.ts';
import type { Loading } from './demo/loading.ts';
import { loadPeople, loadPlaces } from './demo/people-and-places.ts';
import { loadHold, placeProbes, writeFleetFile } from './demo/present-day.ts';
import { loadProbes } from './demo/probes.ts';
import { loadReadings } from './demo/readings.ts';
import { loadStandards } from './demo/standards.ts';
import { writeTrail } from './demo/trail.ts';

const url = process.env['DATABASE_URL'];
const fleetFile = process.env['SIMULATOR_FILE'] ?? '.data/simulator.json';
if (!url) {
  console.error(
    'DATABASE_URL is not set. Run `npm start` or `npm run reset`, which know the private database.',
  );
  process.exit(2);
}

const minuteMs = 60_000;
const startedAt = performance.now();
const sequelize = connectDatabase(url);
try {
  if ((await User.count()) > 0)
    throw new Error(
      'The database already holds people. The demo is loaded into an empty one only: npm run reset.',
    );
  const endAt = Math.floor(Date.now() / minuteMs) * minuteMs;
  const loading: Loading = {
    sequelize,
    history: scenarioHistory({ endAt }),
    seed: demoSeed,
    users: new Map(),
    sites: new Map(),
    points: new Map(),
    probes: new Map(),
    devices: new Map(),
    standards: new Map(),
    trail: [],
  };
  placeProbes(loading);
  await loadPlaces(loading);
  await loadPeople(loading);
  await loadStandards(loading);
  await loadBottles(loading);
  await loadInstruments(loading);
  await loadProbes(loading);
  const checks = await loadChecks(loading);
  await loadHold(loading);
  const readings = await loadReadings(loading, url);
  const events = await writeTrail(loading);
  mkdirSync(dirname(fleetFile), { recursive: true });
  const devices = await writeFleetFile(loading, fleetFile);
  // Last: only a whole demo counts as loaded.
  await Setting.create({ key: 'demo', value: { loadedAt: new Date() } });
  const seconds = Math.round((performance.now() - startedAt) / 1000);
  console.log(
    `${readings} readings, ${checks} comparisons, ${events} audit events and ${devices} devices in ${seconds} s.`,
  );
} finally {
  await sequelize.close();
}

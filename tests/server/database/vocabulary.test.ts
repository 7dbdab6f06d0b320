import pg from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import * as words from '../../../shared/contracts/vocabulary.ts';
import { freshDatabase, type TestDatabase } from '../../support/database.ts';

let database: TestDatabase;
/** The text of every check constraint, under `table.column`. */
const checks = new Map<string, string>();

beforeAll(async () => {
  database = await freshDatabase();
  const client = new pg.Client({ connectionString: database.ownerUrl });
  await client.connect();
  const { rows } = await client.query<{ name: string; definition: string }>(
    `select c.relname || '.' || a.attname as name, pg_get_constraintdef(k.oid) as definition
     from pg_constraint k join pg_class c on c.oid = k.conrelid
       join pg_attribute a on a.attrelid = c.oid and a.attnum = any (k.conkey)
     where k.contype = 'c' and cardinality(k.conkey) = 1`,
  );
  for (const { name, definition } of rows) checks.set(name, definition);
  await client.end();
});
afterAll(() => database.drop());

it.each([
  ['memberships.role', words.roles],
  ['points.display_unit', words.displayUnits],
  ['points.compensation_model', words.compensationModels],
  ['points.decision_rule', words.decisionRules],
  ['points.interval_method', words.intervalMethods],
  ['points.criticality', words.criticalities],
  ['points.hazard_tags', words.hazardTags],
  ['probes.kind', words.probeKinds],
  ['probes.status', words.probeStatuses],
  ['probes.temperature_sensor', words.temperatureSensors],
  ['probes.device_compensation', words.deviceCompensations],
  ['cell_constants.origin', words.cellConstantOrigins],
  ['probe_events.kind', words.probeEventKinds],
  ['standards.medium', words.standardMedia],
  ['standards.basis', words.standardBases],
  ['standards.state', words.standardStates],
  ['readings.context', words.readingContexts],
  ['readings.quality', words.readingQualities],
  ['readings.flags', words.readingFlags],
  ['live_readings.context', words.readingContexts],
  ['live_readings.quality', words.readingQualities],
  ['live_readings.flags', words.readingFlags],
  ['checks.stage', words.checkStages],
  ['checks.invalid_reason', words.checkInvalidReasons],
  ['checks.decision_rule', words.decisionRules],
  ['checks.outcome', words.outcomes],
  ['quarantined_messages.code', words.quarantineCodes],
  ['notices.kind', words.noticeKinds],
  ['procedures.probe_kinds', words.probeKinds],
  ['procedures.steps', words.runSteps],
  ['instruments.kind', words.instrumentKinds],
  ['instruments.state', words.instrumentStates],
  ['calibrations.status', words.calibrationStatuses],
  ['calibrations.decision_rule', words.decisionRules],
  ['calibration_steps.step', words.runSteps],
  ['captures.step', words.captureSteps],
  ['captures.source', words.captureSources],
  ['capture_exclusions.code', words.exclusionCodes],
  ['signatures.meaning', words.signatureMeanings],
  ['device_commands.state', words.commandStates],
  ['prompts.kind', words.promptKinds],
] as const)('%s takes exactly the words of the trade', (column, list) => {
  const inDatabase = [...(checks.get(column) ?? '').matchAll(/'([^']+)'::text/g)].map((match) => match[1]!);
  expect(inDatabase.toSorted()).toEqual([...list].toSorted());
});

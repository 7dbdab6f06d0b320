/**
 * What the role that runs the server may do. Granted anew after every migration run, so that a role created
 * later, or a table added later, is covered; all of it is idempotent.
 */
import pg, { type Client } from 'pg';

/** History: the server adds rows and reads them, and can never change or take one away. */
const appendOnlyTables = [
  'audit_events',
  'cell_constants',
  'probe_events',
  'certificates',
  'calibration_steps',
  'captures',
  'capture_exclusions',
  'signatures',
];

/** Functions that run with the owner's rights on the server's behalf. */
const ownerFunctions = ['ensure_reading_partitions(integer, integer)'];

/** True when `appRole` exists and is another role than the one that is migrating. */
async function isSeparateRole(client: Client, appRole: string): Promise<boolean> {
  const { rowCount } = await client.query(
    'select 1 from pg_roles where rolname = $1 and rolname <> current_user',
    [appRole],
  );
  return rowCount === 1;
}

/** Does nothing in a database with a single role: its owner has every right already. */
export async function grantToApplication(client: Client, appRole: string): Promise<void> {
  if (!(await isSeparateRole(client, appRole))) return;
  const role = pg.escapeIdentifier(appRole);
  const statements = [
    `grant usage on schema public to ${role}`,
    `alter default privileges in schema public grant select, insert, update, delete on tables to ${role}`,
    `alter default privileges in schema public grant usage on sequences to ${role}`,
    `grant select, insert, update, delete on all tables in schema public to ${role}`,
    `grant usage on all sequences in schema public to ${role}`,
    `revoke insert, update, delete, truncate on migrations from ${role}`,
    ...appendOnlyTables.map((table) => `revoke update, delete, truncate on ${table} from ${role}`),
    ...ownerFunctions.map((signature) => `grant execute on function ${signature} to ${role}`),
  ];
  await client.query(`begin; ${statements.join('; ')}; commit`);
}

/** Takes the default privileges back, so that the role can be dropped once the schema is gone. */
export async function revokeFromApplication(client: Client, appRole: string): Promise<void> {
  if (!(await isSeparateRole(client, appRole))) return;
  const role = pg.escapeIdentifier(appRole);
  await client.query(`
    alter default privileges in schema public revoke all on tables from ${role};
    alter default privileges in schema public revoke all on sequences from ${role};
  `);
}

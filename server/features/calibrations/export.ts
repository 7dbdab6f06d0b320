/**
 * Calibrations as CSV [RFC 4180], UTF-8. It begins with a byte order mark, because spreadsheets otherwise read µ and °
 * in the code page of their country. Every column names its unit, times are ISO 8601 in UTC, and text that a
 * spreadsheet would run as a formula is quoted with an apostrophe.
 *
 * Rows are read page by page into a file without a name, hashed on the way. Only when the trail holds what leaves
 * (filter, count, hash) is it sent from there: nothing leaves unrecorded, and no list is held in memory.
 */
import { createHash, randomUUID } from 'node:crypto';
import { open, unlink, type FileHandle } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { stringify } from 'csv-stringify';
import type { CalibrationsQuery, Verdict } from '../../../shared/contracts/calibrations.ts';
import { Calibration } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import type { ByteAnswer } from '../../http/route.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { selectRuns, type ListedRun, type RunFilter } from './queries.ts';
import { filterOf } from './service.ts';

export type ExportQuery = Omit<CalibrationsQuery, 'limit' | 'cursor'>;

type Cell = string | number | null;
interface Column {
  head: string;
  of: (row: ListedRun, more: Calibration) => Cell;
}

const instant = (at: Date | null): string | null => at?.toISOString() ?? null;
const figures = (stage: string, of: (more: Calibration) => Verdict | null): Column[] => [
  { head: `${stage} probe (µS/cm)`, of: (_, more) => of(more)?.meanUsCm ?? null },
  { head: `${stage} reference (µS/cm)`, of: (_, more) => of(more)?.referenceUsCm ?? null },
  { head: `${stage} temperature (°C)`, of: (_, more) => of(more)?.meanTemperatureC ?? null },
  { head: `${stage} error (%)`, of: (_, more) => of(more)?.errorPercent ?? null },
  {
    head: `${stage} expanded uncertainty U (%)`,
    of: (_, more) => of(more)?.expandedUncertaintyPercent ?? null,
  },
  { head: `${stage} coverage factor k`, of: (_, more) => of(more)?.coverageFactor ?? null },
  { head: `${stage} outcome`, of: (_, more) => of(more)?.outcome ?? null },
  { head: `${stage} probability outside`, of: (_, more) => of(more)?.probabilityOutside ?? null },
];

const columns: readonly Column[] = [
  { head: 'Record number', of: (row) => row.number },
  { head: 'Status', of: (row) => row.status },
  { head: 'Site', of: (row) => row.siteName },
  { head: 'Point', of: (row) => row.pointCode },
  { head: 'Point name', of: (row) => row.pointName },
  { head: 'Probe', of: (row) => row.probeTag },
  { head: 'Serial', of: (row) => row.probeSerial },
  { head: 'Reference solution lot', of: (row) => row.lotCode },
  { head: 'Performed by', of: (row) => row.performer },
  { head: 'Started (UTC)', of: (row) => instant(row.startedAt) },
  { head: 'Signed (UTC)', of: (row) => instant(row.signedAt) },
  { head: 'Approved (UTC)', of: (row) => instant(row.approvedAt) },
  { head: 'Tolerance (%)', of: (_, more) => more.tolerancePercent },
  { head: 'Decision rule', of: (_, more) => more.decisionRule },
  ...figures('As found', ({ judgement }) => judgement.asFound),
  ...figures('Cleaned', ({ judgement }) => judgement.cleaned),
  ...figures('As left', ({ judgement }) => judgement.asLeft),
  {
    head: 'As left equals cleaned',
    of: (_, { judgement }) => (judgement.asLeftEqualsCleaned ? 'yes' : 'no'),
  },
  { head: 'Cell constant before (1/cm)', of: (_, more) => more.cellConstantBeforePerCm },
  { head: 'Cell constant after (1/cm)', of: (_, more) => more.cellConstantAfterPerCm },
  { head: 'Due on', of: (row) => row.dueOn },
  { head: 'Record SHA-256', of: (_, more) => more.recordHash },
];

const rowsAtOnce = 200;

async function* rowsOf(parts: Parts, filter: RunFilter): AsyncGenerator<Cell[]> {
  let after: [number, number] | null = null;
  for (;;) {
    const page: ListedRun[] = await selectRuns(parts, filter, after, rowsAtOnce);
    const whole = await Calibration.findAll({
      attributes: { exclude: ['record', 'plan', 'override'] },
      where: { id: page.map(({ id }) => id) },
    });
    const byId = new Map(whole.map((one) => [one.id, one]));
    for (const row of page) {
      const more = byId.get(row.id);
      if (more) yield columns.map((column) => column.of(row, more));
    }
    const last = page.at(-1);
    if (!last || page.length < rowsAtOnce) return;
    after = [last.startedUs, last.id];
  }
}

interface Spooled {
  file: FileHandle;
  rowCount: number;
  sha256: string;
}

/** The file has no name from the moment it is open: when this process ends, however it ends, it is gone. */
async function spool(parts: Parts, filter: RunFilter): Promise<Spooled> {
  const path = join(tmpdir(), `saltmark-export-${randomUUID()}`);
  const file = await open(path, 'wx+', 0o600);
  await unlink(path);
  const hash = createHash('sha256');
  let rowCount = 0;
  const counted = async function* (): AsyncGenerator<Cell[]> {
    for await (const row of rowsOf(parts, filter)) {
      rowCount += 1;
      yield row;
    }
  };
  const csv = stringify({
    header: true,
    columns: columns.map(({ head }) => head),
    bom: true,
    record_delimiter: '\r\n',
    escape_formulas: true,
  });
  try {
    await pipeline(counted, csv, async (chunks: AsyncIterable<Buffer | string>) => {
      for await (const chunk of chunks) {
        const bytes = Buffer.from(chunk);
        hash.update(bytes);
        await file.appendFile(bytes);
      }
    });
  } catch (error) {
    await file.close();
    throw error;
  }
  return { file, rowCount, sha256: hash.digest('hex') };
}

/** One site's people may read of it when it is theirs alone; otherwise it is the organisation's entry. */
function siteOfExport(actor: Actor, query: ExportQuery): number | null {
  if (query.siteId !== undefined) return query.siteId;
  const readable = readableSites(actor);
  return readable?.length === 1 ? (readable[0] ?? null) : null;
}

export async function exportCalibrations(
  parts: Parts,
  actor: Actor,
  query: ExportQuery,
): Promise<ByteAnswer> {
  const { file, rowCount, sha256 } = await spool(parts, filterOf(actor, query));
  try {
    await inTransaction(parts.sequelize, (transaction) =>
      recordAuditEvent(parts, transaction, actor, {
        action: 'calibrations.exported',
        objectKind: 'calibrations',
        objectId: null,
        siteId: siteOfExport(actor, query),
        newValue: { form: 'CSV', filter: query, rowCount, sha256 },
      }),
    );
  } catch (error) {
    await file.close();
    throw error;
  }
  const day = parts.clock.now().toISOString().slice(0, 10);
  return {
    mediaType: 'text/csv; charset=utf-8',
    bytes: file.createReadStream({ start: 0 }),
    fileName: `calibrations-${day}.csv`,
  };
}

/** What leaves the house: the record on paper and the list for a spreadsheet. Both stand on the trail. */
import { calibrationsQuery } from '../../../shared/contracts/calibrations.ts';
import { idPath } from '../../../shared/contracts/common.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { exportCalibrations } from './export.ts';
import { downloadRecordPdf } from './record-download.ts';

/** Mounted before the routes that take an id: `export.csv` is none. */
export const recordRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/calibrations/export.csv',
    access: 'session',
    does: 'Exports calibrations as CSV (UTF-8 with byte order mark, units in the heads, times in UTC); the export is audited.',
    query: calibrationsQuery.omit({ limit: true, cursor: true }),
    sends: ['text/csv'],
    run: ({ parts, actor, query }) => exportCalibrations(parts, actor, query),
  }),
  route({
    verb: 'get',
    path: '/api/calibrations/:id/record.pdf',
    access: 'session',
    does: 'The signed record as a PDF; the download is audited.',
    params: idPath,
    sends: ['application/pdf'],
    run: ({ parts, actor, params }) => downloadRecordPdf(parts, actor, params.id),
  }),
];

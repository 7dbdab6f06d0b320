/** A capture from the stream names its reading; what is stored of that reading must be what was captured. */
import type { Transaction } from 'sequelize';
import type { CaptureReading } from '../../../shared/contracts/calibrations.ts';
import { Device, DeviceBoot, DeviceSettings, Reading, type Capture } from '../../db/models/index.ts';
import { AppError } from '../../errors.ts';
import type { Run } from './runs.ts';

export interface Origin {
  deviceId: number | null;
  /** In use in the device when it showed the value. */
  cellConstantPerCm: number;
}

const invalid = (path: string, message: string): AppError =>
  new AppError('request.invalid', { issues: [{ path, message }] });

export async function traceReading(
  transaction: Transaction,
  run: Run,
  input: CaptureReading,
): Promise<Origin> {
  const device = await deviceOf(transaction, run, input.source === 'stream' ? input.boot : null);
  const reported = device?.reportedCellConstantPerCm ?? run.row.cellConstantBeforePerCm;
  if (input.source === 'typed') return { deviceId: null, cellConstantPerCm: reported };
  if (input.boot === null || input.n === null)
    throw invalid('n', 'A reading of the stream names its boot and number.');
  if (!device) throw invalid('source', 'This probe has no device that could have sent it: type the value.');
  const isTaken = run.captures.some(
    (capture) => capture.step === input.step && capture.boot === input.boot && capture.n === input.n,
  );
  if (isTaken) throw invalid('n', 'This reading is captured already. Wait for the next one.');
  const reading = await storedReading(transaction, device.id, input.boot, input.n);
  if (!reading) return { deviceId: device.id, cellConstantPerCm: reported };
  if (!isSameReading(reading, input) || reading.probeId !== run.row.probeId)
    throw invalid('conductivityUsCm', 'The reading of this number as it was stored shows another value.');
  const settings =
    reading.settingsId === null ? null : await DeviceSettings.findByPk(reading.settingsId, { transaction });
  return { deviceId: device.id, cellConstantPerCm: settings?.cellConstantPerCm ?? reported };
}

/** The device that speaks for the probe; for an older boot the one that had it. */
async function deviceOf(transaction: Transaction, run: Run, boot: string | null): Promise<Device | null> {
  const { probeId } = run.row;
  const active = await Device.findOne({ where: { probeId, revokedAt: null }, transaction });
  if (boot === null) return active;
  const known = await DeviceBoot.findOne({
    where: { boot },
    include: [{ association: 'device', where: { probeId } }],
    order: [['id', 'DESC']],
    transaction,
  });
  return known?.device ?? active;
}

async function storedReading(
  transaction: Transaction | null,
  deviceId: number,
  boot: string,
  n: number,
): Promise<Reading | null> {
  const known = await DeviceBoot.findOne({ where: { deviceId, boot }, transaction });
  return known && Reading.findOne({ where: { deviceId, bootId: known.id, n }, transaction });
}

const isSameReading = (
  reading: Reading,
  shown: { conductivityUsCm: number; temperatureC: number },
): boolean =>
  reading.conductivityUsCm === shown.conductivityUsCm && reading.temperatureC === shown.temperatureC;

/** Captures whose reading arrived later than they did and turned out to differ. */
export async function contradictedCaptures(transaction: Transaction, run: Run): Promise<Capture[]> {
  const differing: Capture[] = [];
  for (const capture of run.captures) {
    const { deviceId, boot, n, exclusion } = capture;
    if (deviceId === null || boot === null || n === null || exclusion) continue;
    const reading = await storedReading(transaction, deviceId, boot, n);
    if (reading && !isSameReading(reading, capture)) differing.push(capture);
  }
  return differing;
}

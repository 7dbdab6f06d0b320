import { Link } from 'react-router-dom';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import {
  capitalise,
  CELL_CONSTANT_ORIGIN_LABELS,
  DEVICE_COMPENSATION_LABELS,
  PROBE_KIND_LABELS,
  PROBE_STATUS_LABELS,
  TEMPERATURE_SENSOR_LABELS,
} from '../../../../../shared/format/labels.ts';
import { formatConductivity } from '../../../../../shared/format/numbers.ts';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { formatCellConstant } from '../model.ts';

/** What is recorded about the probe itself. */
export function ProbeFacts({ probe }: { probe: Probe }) {
  return (
    <section>
      <SectionTitle>Probe</SectionTitle>
      <DefinitionList
        items={[
          { term: 'Serial number', value: probe.serial },
          { term: 'Tag', value: probe.tag },
          { term: 'Kind', value: PROBE_KIND_LABELS[probe.kind] },
          { term: 'State', value: PROBE_STATUS_LABELS[probe.status] },
          { term: 'Kept at', value: probe.siteName },
          { term: 'Nominal cell constant', value: formatCellConstant(probe.nominalCellConstantPerCm) },
          { term: 'Cell constant in use', value: formatCellConstant(probe.cellConstantPerCm) },
          { term: 'Range', value: rangeWords(probe) },
          { term: 'Temperature sensor', value: TEMPERATURE_SENSOR_LABELS[probe.temperatureSensor] },
          {
            term: 'Its own compensation',
            value: `${DEVICE_COMPENSATION_LABELS[probe.deviceCompensation]} (readings come raw)`,
          },
          ...(probe.notes ? [{ term: 'Notes', value: probe.notes }] : []),
        ]}
      />
    </section>
  );
}

function rangeWords({ rangeLowUsCm, rangeHighUsCm }: Probe): string {
  const unit = rangeHighUsCm >= 10_000 ? 'mS/cm' : 'µS/cm';
  const low = formatConductivity({ conductivityUsCm: rangeLowUsCm, unit });
  const high = formatConductivity({ conductivityUsCm: rangeHighUsCm, unit });
  return `${low.value} to ${high.text}`;
}

/** Where it stood and when, newest first. */
export function Placements({ probe, timeZone }: { probe: Probe; timeZone: string }) {
  return (
    <section>
      <SectionTitle note="newest first">Where it stood</SectionTitle>
      {probe.placements.length === 0 ? <p className="text-ink-2">It was never installed.</p> : null}
      <ul className="stands">
        {probe.placements.map((stand) => (
          <li key={stand.id}>
            <span>
              {formatDate(stand.fromAt, { timeZone })} to{' '}
              {stand.toAt ? formatDate(stand.toAt, { timeZone }) : 'now'}
            </span>
            <span>
              <Link className="link" to={paths.point.to({ id: stand.pointId })}>
                {stand.pointName}
              </Link>
              <small>
                {stand.siteName} · {stand.areaName} · {stand.pointCode}
              </small>
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}

/** Every cell constant that was ever in use, newest first, with who set it and why. */
export function CellConstants({ probe, timeZone }: { probe: Probe; timeZone: string }) {
  return (
    <section>
      <SectionTitle note="newest first">Cell constants in use</SectionTitle>
      <ul className="stands">
        {probe.cellConstants.map((entry) => (
          <li key={entry.fromAt}>
            <span>since {formatDate(entry.fromAt, { timeZone })}</span>
            <span>
              <b className="font-mono font-medium">{formatCellConstant(entry.cellConstantPerCm)}</b>
              <small>
                {[capitalise(CELL_CONSTANT_ORIGIN_LABELS[entry.origin]), entry.by, entry.reason]
                  .filter(Boolean)
                  .join(' · ')}
              </small>
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}

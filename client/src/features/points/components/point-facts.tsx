import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { Point } from '../../../../../shared/contracts/points.ts';
import { formatDate, formatDateTime } from '../../../../../shared/format/dates.ts';
import {
  CRITICALITY_LABELS,
  DECISION_RULE_LABELS,
  DECISION_RULE_SENTENCES,
  DISPLAY_UNIT_LABELS,
  INTERVAL_METHOD_LABELS,
} from '../../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { pointProbes } from '../api.ts';
import { compensationWords, limitWords } from '../model.ts';

/** What a reading at this point must satisfy. */
export function Requirements({ point }: { point: Point }) {
  return (
    <section>
      <SectionTitle note="what a reading there must satisfy">Requirements</SectionTitle>
      <DefinitionList
        items={[
          { term: 'What it decides', value: point.duty },
          { term: 'Medium', value: point.medium },
          {
            term: 'Tolerance',
            value: `± ${formatNumber(point.tolerancePercent, { unit: '%' })}, maximum permissible error`,
          },
          {
            term: 'Decision rule',
            value: (
              <>
                {DECISION_RULE_LABELS[point.decisionRule]}
                <small className="definition-note">{DECISION_RULE_SENTENCES[point.decisionRule]}</small>
              </>
            ),
          },
          {
            term: 'Interval',
            value: `${formatNumber(point.intervalDays, { decimals: 0 })} days, ${INTERVAL_METHOD_LABELS[point.intervalMethod]}`,
          },
          { term: 'Limits of the process', value: limitWords(point) ?? 'none' },
          { term: 'Compensation', value: compensationWords(point) },
          { term: 'Shown in', value: DISPLAY_UNIT_LABELS[point.displayUnit] },
          { term: 'Criticality', value: CRITICALITY_LABELS[point.criticality] },
          { term: 'What acts on it', value: point.controlNote ?? 'nothing recorded' },
        ]}
      />
    </section>
  );
}

/** Who holds the point, why and until when; nothing while nobody does. */
export function HoldSection({ point, timeZone }: { point: Point; timeZone: string }) {
  const { hold } = point;
  if (!hold) return null;
  return (
    <section>
      <SectionTitle>Held for maintenance</SectionTitle>
      <DefinitionList
        items={[
          { term: 'By', value: hold.userName },
          { term: 'What for', value: hold.reason },
          { term: 'Since', value: formatDateTime(hold.fromAt, { timeZone, offset: true }) },
          { term: 'Back about', value: formatDateTime(hold.untilAt, { timeZone, offset: true }) },
        ]}
      />
    </section>
  );
}

/** The probes that stood there before, newest first. */
export function EarlierProbes({ point, timeZone }: { point: Point; timeZone: string }) {
  const query = useQuery(pointProbes(point.id));
  return (
    <section>
      <SectionTitle note="newest first">Probes that stood here</SectionTitle>
      <Answer query={query} what="the probes" loading={<LoadingFace label="Fetching the probes" rows={2} />}>
        {({ items }) =>
          items.length === 0 ? (
            <p className="text-ink-2">No probe was ever installed here.</p>
          ) : (
            <ul className="stands">
              {items.map((probe) => (
                <li key={probe.fromAt}>
                  <span>
                    {formatDate(probe.fromAt, { timeZone })} to{' '}
                    {probe.toAt ? formatDate(probe.toAt, { timeZone }) : 'now'}
                  </span>
                  <span>
                    <Link className="link" to={paths.probe.to({ id: probe.id })}>
                      {probe.tag}
                    </Link>
                    <small>serial {probe.serial}</small>
                  </span>
                </li>
              ))}
            </ul>
          )
        }
      </Answer>
    </section>
  );
}

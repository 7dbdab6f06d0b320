import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { CalibrationRow, Prompt } from '../../../../../shared/contracts/calibrations.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { countInWords, formatCount } from '../../../../../shared/format/numbers.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { ButtonLink } from '../../../components/ui/button.tsx';
import { EmptyFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import { PhoneRow } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { calibrationsBrief, openPrompts } from '../api.ts';
import { PROMPT_LABELS } from '../words.ts';
import { FindProbe } from './find-probe.tsx';
import { RunList } from './run-list.tsx';
import { UnsentDeeds } from './unsent-deeds.tsx';

export interface TodayProps {
  userId: number;
  zoneOf: (siteId: number) => string;
  /** Whether this person works at probes anywhere. */
  canPerform: boolean;
}

/** What one begins with in the morning: runs to go on with, what is due, and the next probe. */
export function Today({ userId, zoneOf, canPerform }: TodayProps) {
  const runs = useQuery(calibrationsBrief({ status: 'running' }));
  const recent = useQuery(calibrationsBrief({ limit: 12 }));
  const running = runs.data?.items ?? [];
  const own = running.filter((row) => row.performerId === userId);
  const others = running.filter((row) => row.performerId !== userId);
  return (
    <>
      <PageHead name="Calibrations" sentence={sentence(own, others)} />
      <UnsentDeeds userId={userId} />
      {own.length > 0 ? (
        <section>
          <SectionTitle>Go on where you stopped</SectionTitle>
          <RunList label="Your running calibrations" rows={own} zoneOf={zoneOf} />
        </section>
      ) : null}
      {canPerform ? (
        <section className="mt-8">
          <SectionTitle note="scan its label, or type what stands on it">Calibrate a probe</SectionTitle>
          <FindProbe />
        </section>
      ) : null}
      <DueWork canPerform={canPerform} />
      {others.length > 0 ? (
        <section className="mt-8">
          <SectionTitle>Others at work</SectionTitle>
          <RunList label="Running calibrations of others" rows={others} zoneOf={zoneOf} />
        </section>
      ) : null}
      <section className="mt-8">
        <SectionTitle note="newest first">Last calibrations</SectionTitle>
        <Answer query={recent} what="the calibrations">
          {({ items }) => (
            <RunList
              label="Last calibrations"
              rows={items.filter((row) => row.status !== 'running')}
              zoneOf={zoneOf}
              empty={<EmptyFace title="No calibration is on record yet." />}
            />
          )}
        </Answer>
      </section>
    </>
  );
}

function sentence(own: readonly CalibrationRow[], others: readonly CalibrationRow[]) {
  const elsewhere =
    others.length > 0 ? ` ${capitalise(countInWords(others.length))} more at work by others.` : '';
  if (own.length === 0) return `No run of yours is open.${elsewhere}`;
  const [first] = own;
  return (
    <>
      <b>
        {own.length === 1 && first
          ? `Your run at ${first.pointName} is open.`
          : `${capitalise(countInWords(own.length))} of your runs are open.`}
      </b>
      {elsewhere}
    </>
  );
}

/** Work prompts: what is due soon or overdue, the longest overdue first. */
function DueWork({ canPerform }: { canPerform: boolean }) {
  const query = useQuery(openPrompts());
  const items = (query.data?.items ?? []).toSorted((a, b) => (a.dueOn < b.dueOn ? -1 : 1));
  if (items.length === 0) return null;
  return (
    <section className="mt-8">
      <SectionTitle note={formatCount(items.length, 'probe')}>Due</SectionTitle>
      <Ledger
        label="Work that is due"
        rows={items}
        rowKey={(prompt) => prompt.id}
        isHeadSticky={false}
        columns={[
          { key: 'name', head: 'Point', width: '330px', cell: (prompt) => <PromptName prompt={prompt} /> },
          { key: 'site', head: 'Site', width: '220px', cell: (prompt) => prompt.siteName },
          { key: 'due', head: 'Due', width: '220px', cell: dueWords },
          {
            key: 'do',
            head: '',
            width: 'minmax(140px, 1fr)',
            cell: (prompt) => (canPerform ? <Begin prompt={prompt} /> : null),
          },
        ]}
        phone={(prompt) => (
          <PhoneRow
            name={<PromptName prompt={prompt} />}
            value={canPerform ? <Begin prompt={prompt} /> : null}
            more={`${prompt.siteName}, ${dueWords(prompt)}`}
          />
        )}
      />
    </section>
  );
}

const dueWords = (prompt: Prompt): string => `${PROMPT_LABELS[prompt.kind]}, ${formatDate(prompt.dueOn)}`;

function PromptName({ prompt }: { prompt: Prompt }) {
  return (
    <NameCell
      name={
        <Link className="link" to={paths.probe.to({ id: prompt.probeId })}>
          {prompt.pointName}
        </Link>
      }
      note={prompt.probeTag}
    />
  );
}

function Begin({ prompt }: { prompt: Prompt }) {
  return (
    <ButtonLink
      to={paths.startCalibration.to({ probeId: prompt.probeId })}
      aria-label={`Calibrate ${prompt.probeTag}`}
    >
      Calibrate
    </ButtonLink>
  );
}

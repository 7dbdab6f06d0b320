import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Standard, StandardUses } from '../../../../../shared/contracts/standards.ts';
import { formatDate, formatDateTime } from '../../../../../shared/format/dates.ts';
import { capitalise, STANDARD_STATE_LABELS } from '../../../../../shared/format/labels.ts';
import { countInWords, formatCount } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Answer } from '../../../components/ui/answer.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { lotHistory, lotUses } from '../preparation-api.ts';

/** Enough to see who is concerned; a lot in use rests under most probes. */
const SHOWN_AT_FIRST = 5;

/** What a recall would touch, in a sentence with its exception. */
function recallWords({ ifRecalled }: StandardUses): { all: string; exception: string } {
  const { checkCount, calibrationCount, probeCount, probesWithoutOtherEvidence: bare } = ifRecalled;
  if (probeCount === 0) return { all: 'Nothing rests on this lot at your sites.', exception: '' };
  const parts = [formatCount(checkCount, 'comparison')];
  if (calibrationCount > 0) parts.push(formatCount(calibrationCount, 'calibration'));
  return {
    all: `${capitalise(parts.join(' and '))} at ${formatCount(probeCount, 'probe')} rest on it.`,
    exception:
      bare === 0
        ? 'Every one of these probes has been compared with another lot since.'
        : bare === probeCount
          ? 'None of these probes has a newer comparison with another lot: compare them first.'
          : `${capitalise(countInWords(bare))} of them ${bare === 1 ? 'has' : 'have'} nothing newer: compare ${bare === 1 ? 'it' : 'them'} first.`,
  };
}

/** Where a lot was used, and what a recall would leave without evidence. */
export function LotUses({ lot }: { lot: Standard }) {
  const query = useQuery(lotUses(lot.id));
  const [isWhole, setIsWhole] = useState(false);
  const isRecalled = lot.state === 'recalled';
  return (
    <section>
      <SectionTitle>{isRecalled ? 'What the recall touches' : 'If it were recalled'}</SectionTitle>
      <Answer query={query} what="its uses" loading={<LoadingFace label="Fetching its uses" rows={3} />}>
        {(uses) => {
          const words = recallWords(uses);
          const resting = uses.probes.filter((probe) => probe.restsOnThisLot);
          return (
            <>
              <p className="text-ink-2">
                {words.all} <b className="text-ink">{words.exception}</b>
              </p>
              {resting.length > 0 ? (
                <ul className="stands mt-3">
                  {(isWhole ? resting : resting.slice(0, SHOWN_AT_FIRST)).map((probe) => (
                    <li key={probe.probeId}>
                      <span>{formatDate(probe.lastUsedAt)}</span>
                      <span>
                        <Link className="link" to={paths.probe.to({ id: probe.probeId })}>
                          {probe.probeTag}
                        </Link>
                        <small>
                          {probe.pointName ?? 'not installed'}, {probe.siteName}
                        </small>
                      </span>
                    </li>
                  ))}
                </ul>
              ) : null}
              {resting.length > SHOWN_AT_FIRST && !isWhole ? (
                <Button kind="quiet" onClick={() => setIsWhole(true)}>
                  Show all {resting.length}
                </Button>
              ) : null}
              {uses.derivedLots.length > 0 ? (
                <p className="mt-3 text-ink-2">
                  Diluted into{' '}
                  {uses.derivedLots.map((one, index) => (
                    <span key={one.id}>
                      {index > 0 ? ', ' : null}
                      <Link className="link" to={paths.standard.to({ id: one.id })}>
                        {one.code}
                      </Link>{' '}
                      ({STANDARD_STATE_LABELS[one.state]})
                    </span>
                  ))}
                  .
                </p>
              ) : null}
            </>
          );
        }}
      </Answer>
    </section>
  );
}

/** Every state the lot was in, with who said so and why. */
export function LotHistory({ lot }: { lot: Standard }) {
  const query = useQuery(lotHistory(lot.id));
  return (
    <section>
      <SectionTitle note="newest first">States</SectionTitle>
      <Answer query={query} what="its states" loading={<LoadingFace label="Fetching its states" rows={2} />}>
        {({ items }) =>
          items.length === 0 ? (
            <p className="text-ink-2">No change of state is recorded.</p>
          ) : (
            <ul className="stands">
              {items.map((change) => (
                <li key={change.at}>
                  <span>{formatDateTime(change.at)}</span>
                  <span>
                    {capitalise(STANDARD_STATE_LABELS[change.state])}, {change.by}
                    <small>{change.reason ?? 'no reason given'}</small>
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

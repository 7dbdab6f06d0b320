import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Instrument } from '../../../../../shared/contracts/instruments.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import {
  INSTRUMENT_KIND_LABELS,
  UNCERTAINTY_UNIT_LABELS,
} from '../../../../../shared/format/reference-labels.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { paths } from '../../../paths.ts';
import { instrumentUses, useChangeInstrument } from '../api.ts';
import { instrumentState, uncertaintyWords } from '../model.ts';
import { ChangeInstrumentDialog } from './change-instrument-dialog.tsx';

/** One reference instrument: its certificate, whether it may be used, and where it was. */
export function InstrumentView({
  instrument,
  certificate,
}: {
  instrument: Instrument;
  certificate: ReactNode;
}) {
  const [asked, setAsked] = useState<'change' | 'state' | null>(null);
  const state = instrumentState(instrument);
  const isInUse = instrument.state === 'in-use';
  const unit = UNCERTAINTY_UNIT_LABELS[instrument.uncertaintyUnit];
  return (
    <>
      <Crumbs items={[{ label: 'Reference instruments', to: paths.instruments.to() }]} />
      <PageHead
        name={instrument.code}
        sentence={
          <>
            {capitalise(INSTRUMENT_KIND_LABELS[instrument.kind])}, {instrument.name}.{' '}
            <b className={state.tone === 'care' ? 'is-care' : undefined}>{capitalise(state.word)}</b>:{' '}
            {state.note}.
          </>
        }
        aside={
          instrument.can.change ? (
            <div className="page-buttons">
              <Button onClick={() => setAsked('change')}>Change…</Button>
              <Button kind={isInUse ? 'danger' : 'plain'} onClick={() => setAsked('state')}>
                {isInUse ? 'Take out of use…' : 'Put back into use…'}
              </Button>
            </div>
          ) : undefined
        }
      />
      <div className="two-columns">
        <div>
          <section>
            <SectionTitle>Certificate</SectionTitle>
            <DefinitionList
              items={[
                { term: 'Number', value: instrument.certificateNumber },
                { term: 'Expanded uncertainty', value: uncertaintyWords(instrument) },
                {
                  term: 'Correction',
                  value:
                    instrument.correction === 0
                      ? 'none'
                      : `${formatNumber(instrument.correction, { sign: 'always', unit })}, added to what it shows`,
                },
                { term: 'Serial number', value: instrument.serial },
                { term: 'Issued', value: formatDate(instrument.issuedOn) },
                { term: 'Due again', value: formatDate(instrument.dueOn) },
                { term: 'Traceability', value: instrument.traceability || 'not stated' },
              ]}
            />
          </section>
          <Uses instrument={instrument} />
        </div>
        <div>{certificate}</div>
      </div>
      {asked === 'change' ? (
        <ChangeInstrumentDialog instrument={instrument} onClose={() => setAsked(null)} />
      ) : null}
      {asked === 'state' ? <StateDialog instrument={instrument} onClose={() => setAsked(null)} /> : null}
    </>
  );
}

function StateDialog({ instrument, onClose }: { instrument: Instrument; onClose: () => void }) {
  const change = useChangeInstrument(instrument.id);
  const say = useToast();
  const isInUse = instrument.state === 'in-use';
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={isInUse ? `Take ${instrument.code} out of use?` : `Put ${instrument.code} back into use?`}
      sentence={
        isInUse
          ? 'No new run may name it. Runs that used it stay as they are; judge them if its certificate is in doubt.'
          : 'Runs may name it again until its due date.'
      }
      confirmLabel={isInUse ? 'Take out of use' : 'Put back into use'}
      isDanger={isInUse}
      asksReason
      onConfirm={async (reason) => {
        const state = isInUse ? 'out-of-use' : 'in-use';
        await change.mutateAsync({ state, reason, version: instrument.version });
        say(`${instrument.code} is ${isInUse ? 'out of use' : 'in use again'}.`);
      }}
    />
  );
}

function Uses({ instrument }: { instrument: Instrument }) {
  const query = useQuery(instrumentUses(instrument.id));
  return (
    <section>
      <SectionTitle note="newest first">Where it was used</SectionTitle>
      <Answer query={query} what="the runs" loading={<LoadingFace label="Fetching the runs" rows={2} />}>
        {({ items }) =>
          items.length === 0 ? (
            <p className="text-ink-2">No calibration at your sites has used it yet.</p>
          ) : (
            <ul className="stands">
              {items.map((use) => (
                <li key={use.calibrationId}>
                  <span>{formatDate(use.startedAt)}</span>
                  <span>
                    <Link className="link" to={paths.probe.to({ id: use.probeId })}>
                      {use.probeTag}
                    </Link>
                    <small>
                      {use.number ?? 'not signed'}, {use.pointName}, {use.siteName}, {use.performer}
                    </small>
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

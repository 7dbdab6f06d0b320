import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Bottle } from '../../../../../shared/contracts/bottles.ts';
import type { Instrument } from '../../../../../shared/contracts/instruments.ts';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import type { Standard } from '../../../../../shared/contracts/standards.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { PROBE_KIND_LABELS } from '../../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { Checkbox } from '../../../components/ui/checkbox.tsx';
import { EmptyFace } from '../../../components/ui/faces.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { Crumbs, PageHead } from '../../../components/ui/page-head.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { ScanPicture } from '../bench/identify-screen.tsx';
import { canScan } from '../bench/use-scanner.ts';
import {
  calibrationsBrief,
  releasedLots,
  usableBottles,
  usableThermometers,
  useStartCalibration,
} from '../api.ts';
import type { StartDraft } from './start-model.ts';
import { firstChoice, fittingLots } from './start-model.ts';
import type { OverrideDraft } from './override-fields.tsx';
import { NO_OVERRIDE, OverrideFields } from './override-fields.tsx';

export interface StartRunProps {
  probe: Probe;
  userId: number;
}

/** Which bottle, which second lot, which thermometer; then the run begins. */
export function StartRun({ probe, userId }: StartRunProps) {
  const lots = useQuery(releasedLots());
  const thermometers = useQuery(usableThermometers());
  const bottles = useQuery(usableBottles());
  const earlier = useQuery(calibrationsBrief({ probeId: probe.id, limit: 5 }));
  const running = earlier.data?.items.find((row) => row.status === 'running');
  // What was stopped or returned says nothing about what to use.
  const last = earlier.data?.items.find((row) => row.approvedAt !== null || row.status === 'signed') ?? null;
  const place = probe.placement;
  return (
    <>
      <Crumbs
        items={[
          { label: 'Calibrations', to: paths.calibrations.to() },
          { label: probe.tag, to: paths.probe.to({ id: probe.id }) },
        ]}
      />
      <PageHead
        name={place?.pointName ?? probe.tag}
        sentence={
          <>
            <b>
              {probe.tag}, serial {probe.serial}
            </b>
            , {PROBE_KIND_LABELS[probe.kind]}, {place ? place.siteName : 'not installed'}.{' '}
            {earlier.isSuccess ? lastWords(last) : null}
          </>
        }
      />
      {running ? (
        <EmptyFace
          title={`A calibration of this probe is running, by ${running.performer}.`}
          actions={
            <ButtonLink kind="primary" to={paths.calibration.to({ id: running.id })}>
              Open it
            </ButtonLink>
          }
        />
      ) : (
        <Answer query={lots} what="the reference solutions">
          {(known) => (
            <Answer query={bottles} what="the bottles">
              {(atHand) => (
                <Answer query={thermometers} what="the thermometers">
                  {(instruments) => (
                    <StartForm
                      probe={probe}
                      userId={userId}
                      lots={known.items}
                      bottles={atHand.items}
                      thermometers={instruments.items}
                      lastLotCode={last?.lotCode ?? null}
                    />
                  )}
                </Answer>
              )}
            </Answer>
          )}
        </Answer>
      )}
    </>
  );
}

function lastWords(last: { startedAt: string; performer: string } | null): string {
  return last
    ? `Last calibrated ${formatDate(last.startedAt)} by ${last.performer}.`
    : 'Never calibrated here.';
}

interface StartFormProps extends StartRunProps {
  lots: readonly Standard[];
  bottles: readonly Bottle[];
  thermometers: readonly Instrument[];
  lastLotCode: string | null;
}

function StartForm({ probe, userId, lots, bottles, thermometers, lastLotCode }: StartFormProps) {
  const navigate = useNavigate();
  const start = useStartCalibration(userId);
  const fitting = fittingLots(lots, probe);
  const [draft, setDraft] = useState<StartDraft>(() =>
    firstChoice({
      fitting,
      bottles,
      thermometers,
      lastLotCode,
      workingUsCm: probe.reading?.conductivityUsCm ?? null,
    }),
  );
  const [override, setOverride] = useState<OverrideDraft>(NO_OVERRIDE);
  const [showsAll, setShowsAll] = useState(false);
  const [isScanning, setIsScanning] = useState(false);
  // One key for this visit: pressed twice in a dead spot, the run still begins once.
  const [key] = useState(() => crypto.randomUUID());
  const { isPending, refusal, issueFor, submit } = useSubmission();
  const shown = showsAll ? fitting : fitting.filter((lot) => lot.isUsable);
  const isUnusable = fitting.some(
    (lot) => [draft.standardId, draft.secondStandardId].includes(lot.id) && !lot.isUsable,
  );
  const ownBottles = bottles.filter((bottle) => bottle.standardId === draft.standardId);
  const takeLot = (standardId: number | null) =>
    setDraft({
      ...draft,
      standardId,
      bottleId: bottles.find((bottle) => bottle.standardId === standardId)?.id ?? null,
      secondStandardId: draft.secondStandardId === standardId ? null : draft.secondStandardId,
    });
  const scanned = (code: string) => {
    setIsScanning(false);
    const bottle = bottles.find((one) => code.includes(one.code));
    if (bottle) setDraft({ ...draft, standardId: bottle.standardId, bottleId: bottle.id });
  };
  const begin = () =>
    submit(
      async () => {
        const run = await start.mutateAsync({
          key,
          probeId: probe.id,
          standardId: draft.standardId!,
          bottleId: draft.bottleId,
          secondStandardId: draft.secondStandardId,
          thermometerId: draft.thermometerId,
          override: isUnusable
            ? { byUserId: Number(override.byUserId), password: override.password, reason: override.reason }
            : null,
          capturedAt: new Date().toISOString(),
        });
        void navigate(paths.calibration.to({ id: run.id }), { replace: true });
      },
      { standardId: draft.standardId === null ? 'Choose the lot you have with you.' : undefined },
    );
  return (
    <form
      className="start-form"
      onSubmit={(event) => {
        event.preventDefault();
        void begin();
      }}
    >
      {isScanning ? <ScanPicture onCode={scanned} onClose={() => setIsScanning(false)} /> : null}
      <Field
        label="Reference solution"
        error={issueFor('standardId')}
        hint="For as found, cleaned and as left."
      >
        <LotSelect lots={shown} value={draft.standardId} onChange={takeLot} />
      </Field>
      <Field label="Bottle" error={issueFor('bottleId')} isOptional>
        <Select
          value={String(draft.bottleId ?? '')}
          placeholder={ownBottles.length === 0 ? 'no usable bottle on record' : 'without a bottle on record'}
          options={ownBottles.map((bottle) => ({ value: String(bottle.id), label: bottleWords(bottle) }))}
          onChange={(event) => setDraft({ ...draft, bottleId: Number(event.target.value) || null })}
        />
      </Field>
      {canScan() && !isScanning ? (
        <Button onClick={() => setIsScanning(true)}>Scan the bottle instead</Button>
      ) : null}
      <Field
        label="Lot for the second point"
        error={issueFor('secondStandardId')}
        hint="Another lot, at another level: it shows whether the first one can be believed."
      >
        <LotSelect
          lots={shown.filter((lot) => lot.id !== draft.standardId)}
          value={draft.secondStandardId}
          placeholder="none"
          onChange={(secondStandardId) => setDraft({ ...draft, secondStandardId })}
        />
      </Field>
      <Field label="Reference thermometer" error={issueFor('thermometerId')}>
        <Select
          value={String(draft.thermometerId ?? '')}
          placeholder="none"
          options={thermometers.map((one) => ({ value: String(one.id), label: thermometerWords(one) }))}
          onChange={(event) => setDraft({ ...draft, thermometerId: Number(event.target.value) || null })}
        />
      </Field>
      {shown.length < fitting.length || showsAll ? (
        <Checkbox
          label="Show lots that are not usable as well"
          hint="Another person must answer for them here and now."
          isChecked={showsAll}
          onChange={setShowsAll}
        />
      ) : null}
      {isUnusable ? <OverrideFields draft={override} onChange={setOverride} issueFor={issueFor} /> : null}
      <FormRefusal>{refusal}</FormRefusal>
      <Button kind="primary" type="submit" className="start-begin" isPending={isPending}>
        Begin
      </Button>
    </form>
  );
}

interface LotSelectProps {
  lots: readonly Standard[];
  value: number | null;
  placeholder?: string;
  onChange: (id: number | null) => void;
}

function LotSelect({ lots, value, placeholder = 'choose a lot', onChange }: LotSelectProps) {
  return (
    <Select
      value={String(value ?? '')}
      placeholder={placeholder}
      options={lots.map((lot) => ({
        value: String(lot.id),
        label: `${lot.code}, ${lot.label}${lot.isUsable ? '' : ', not usable'}`,
      }))}
      onChange={(event) => onChange(Number(event.target.value) || null)}
    />
  );
}

function bottleWords(bottle: Bottle): string {
  const left = formatNumber(bottle.remainingMl, { decimals: 0, unit: 'mL' });
  const opened = bottle.openedAt ? `opened ${formatDate(bottle.openedAt)}` : 'unopened';
  return `${bottle.code}, ${left} left, ${opened}`;
}

function thermometerWords(one: Instrument): string {
  const U = formatNumber(one.expandedUncertainty, { significantDigits: 2, unit: '°C' });
  return `${one.code}, U ${U}, due ${formatDate(one.dueOn)}`;
}

import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { formatDate, formatDateTime } from '../../../../../shared/format/dates.ts';
import { formatNumber, formatSigned } from '../../../../../shared/format/numbers.ts';
import { COMMAND_LABELS, changeWords } from '../../../../../shared/format/calibration-words.ts';
import type { Definition } from '../../../components/ui/definition-list.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';

/** What follows from the three states: fouling and drift apart, what was changed, and whether the device has it. */
export function RunFacts({ run, timeZone }: { run: Calibration; timeZone: string }) {
  const { judgement } = run;
  const items: (Definition | null)[] = [
    judgement.fouling && { term: 'Fouling', value: changeWords(judgement.fouling) },
    judgement.driftSinceAsLeft && {
      term: 'Drift since last as left',
      value: changeWords(judgement.driftSinceAsLeft),
    },
    {
      term: 'Cell constant',
      value: run.isAdjusted
        ? `${perCm(run.cellConstantBeforePerCm)} → ${perCm(run.cellConstantAfterPerCm)}`
        : `${perCm(run.cellConstantBeforePerCm)}, left as it was`,
    },
    run.command && { term: 'In the device', value: commandWords(run.command, timeZone) },
    judgement.secondPointAgrees === null
      ? null
      : { term: 'Second point', value: judgement.secondPointAgrees ? 'agrees' : 'does not agree' },
    judgement.temperatureErrorC === null
      ? null
      : { term: 'Temperature sensor', value: formatSigned(judgement.temperatureErrorC, 2, '°C') },
    judgement.zeroUsCm === null
      ? null
      : {
          term: 'Zero in air',
          value: formatNumber(judgement.zeroUsCm, { significantDigits: 2, unit: 'µS/cm' }),
        },
    { term: 'Procedure', value: `${run.procedure.name}, version ${run.procedure.version}` },
    run.dueOn ? { term: 'Next due', value: formatDate(run.dueOn) } : null,
  ];
  return (
    <section>
      <SectionTitle>What follows</SectionTitle>
      <DefinitionList items={items.filter((item) => item !== null)} />
    </section>
  );
}

const perCm = (value: number | null): string => formatNumber(value, { significantDigits: 5, unit: 'cm⁻¹' });

/** The device is asked, and only its own word counts. */
export function commandWords(command: NonNullable<Calibration['command']>, timeZone: string): string {
  const constant = perCm(command.cellConstantPerCm);
  const when = (at: string | null) => formatDateTime(at, { timeZone });
  switch (command.state) {
    case 'confirmed':
      return `new constant ${constant} confirmed by the device ${when(command.answeredAt)}`;
    case 'waiting':
      return `${constant} ${COMMAND_LABELS.waiting}, asked ${when(command.requestedAt)}`;
    case 'failed':
      return `${constant} ${COMMAND_LABELS.failed}${command.detail ? `, ${command.detail}` : ''}`;
  }
}

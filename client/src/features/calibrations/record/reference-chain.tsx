import { Link } from 'react-router-dom';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';

/** From the liquid the probe stood in, up to what it is traceable to. */
export function ReferenceChain({ run }: { run: Calibration }) {
  const { lot, secondLot, thermometer, override, judgement } = run;
  const source = (judgement.cleaned ?? judgement.asFound ?? judgement.asLeft)?.referenceSource;
  return (
    <section>
      <SectionTitle>Where the reference comes from</SectionTitle>
      <ul className="run-chain">
        {lot.bottleCode ? (
          <li>
            <b>Bottle {lot.bottleCode}</b>
          </li>
        ) : null}
        <li>
          <b>
            <Link className="link" to={paths.standard.to({ id: lot.id })}>
              Lot {lot.code}
            </Link>
          </b>
          {lot.label}
        </li>
        {source ? (
          <li>
            <b>Its value</b>
            {source}
          </li>
        ) : null}
        {secondLot ? (
          <li>
            <b>
              Second point:{' '}
              <Link className="link" to={paths.standard.to({ id: secondLot.id })}>
                lot {secondLot.code}
              </Link>
            </b>
            {secondLot.label}
          </li>
        ) : null}
        {thermometer ? (
          <li>
            <b>Thermometer {thermometer.code}</b>±
            {formatNumber(thermometer.expandedUncertaintyC, { significantDigits: 2, unit: '°C' })}, due{' '}
            {formatDate(thermometer.dueOn)}
          </li>
        ) : (
          <li>
            <b>No reference thermometer</b>the probe’s own temperature was taken
          </li>
        )}
      </ul>
      {override ? (
        <p className="run-note">
          <b>Used although not released:</b> {override.by} answered for it. {override.reason}
        </p>
      ) : null}
      <p className="run-note">{run.plan.sentence}</p>
    </section>
  );
}

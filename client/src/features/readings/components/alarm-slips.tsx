import type { LiveRow } from '../../../../../shared/contracts/readings.ts';
import { capitalise, ALERT_LEVEL_LABELS } from '../../../../../shared/format/labels.ts';
import { countInWords } from '../../../../../shared/format/numbers.ts';
import { AlertSlip } from '../../../components/layout/alert-slip.tsx';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { alarmsOf, alarmWords, rowHref } from '../live-row.ts';

export interface AlarmSlipsProps {
  rows: readonly LiveRow[];
  /** Several sites are on the page: the site is then named too. */
  namesSite?: boolean;
  onHold: (row: LiveRow) => void;
}

/** One slab for each reading that must not be used and that nobody has taken. */
export function AlarmSlips({ rows, namesSite = false, onHold }: AlarmSlipsProps) {
  const { shown, more } = alarmsOf(rows);
  return (
    <>
      {shown.map((row) => (
        <AlertSlip
          key={row.point.id}
          level={capitalise(ALERT_LEVEL_LABELS['respond-now'])}
          due="within ten minutes"
          actions={
            <>
              {row.can.hold ? (
                <Button kind="slip" onClick={() => onHold(row)}>
                  Take it…
                </Button>
              ) : null}
              <ButtonLink kind="slip-second" to={rowHref(row)}>
                Look closer
              </ButtonLink>
            </>
          }
        >
          <b>
            {namesSite ? `${row.point.siteName}, ` : ''}
            {row.point.name}: do not use this reading.
          </b>{' '}
          {alarmWords(row)}
        </AlertSlip>
      ))}
      {more > 0 ? (
        <p className="live-more">
          {capitalise(countInWords(more))} more {more === 1 ? 'stands' : 'stand'} between red lines below.
        </p>
      ) : null}
    </>
  );
}

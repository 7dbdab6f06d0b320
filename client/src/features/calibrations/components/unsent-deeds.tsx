import { Link } from 'react-router-dom';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { paths } from '../../../paths.ts';
import { useQueue } from '../offline/phone-queue.ts';

/** What still lies on this phone, with the way to its run. */
export function UnsentDeeds({ userId }: { userId: number }) {
  const { entries } = useQueue();
  const own = entries.filter((entry) => entry.userId === userId);
  const foreign = entries.length - own.length;
  const runs = [...new Set(own.map((entry) => entry.deed.calibrationId))];
  if (entries.length === 0) return null;
  return (
    <div className="mb-6" role="status">
      {runs.map((id) => {
        const mine = own.filter((entry) => entry.deed.calibrationId === id);
        const refused = mine.filter((entry) => entry.refusal !== null).length;
        const waiting = mine.length - refused;
        return (
          <p key={id}>
            <Link className="link" to={paths.calibration.to({ id })}>
              Run {id}
            </Link>
            : saved on this phone, {formatNumber(waiting, { decimals: 0 })} not yet sent
            {refused > 0 ? `, ${formatNumber(refused, { decimals: 0 })} not accepted` : ''}.
          </p>
        );
      })}
      {foreign > 0 ? (
        <p>
          {formatNumber(foreign, { decimals: 0 })} more on this phone belong to another person and go up when
          that person signs in here.
        </p>
      ) : null}
    </div>
  );
}

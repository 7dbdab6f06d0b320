import { Link } from 'react-router-dom';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { labelOf, ROLE_LABELS } from '../../../../../shared/format/labels.ts';
import { MEANING_LABELS } from '../../../../../shared/format/calibration-words.ts';
import { paths } from '../../../paths.ts';

/** Who answers for it, in which words, and whether it changed since. */
export function Signatures({ run, timeZone }: { run: Calibration; timeZone: string }) {
  if (run.signatures.length === 0) return null;
  return (
    <div className="run-signatures">
      {run.signatures.map((signature) => (
        <div key={`${signature.meaning}-${signature.signedAt}`}>
          <h3>{MEANING_LABELS[signature.meaning]}</h3>
          <p>
            <b>{signature.name}</b>, {labelOf(ROLE_LABELS, signature.role)}
            <br />
            {formatDateTime(signature.signedAt, { timeZone, seconds: true, offset: true })}
            <br />“{signature.statement}”
          </p>
          {signature.note ? <p>{signature.note}</p> : null}
        </div>
      ))}
      <div>
        <h3>Changed since signing</h3>
        <p>
          {run.amendedBy ? (
            <>
              amended by{' '}
              <Link className="link" to={paths.calibration.to({ id: run.amendedBy.id })}>
                {run.amendedBy.number}
              </Link>
            </>
          ) : (
            <b>no</b>
          )}
        </p>
        {run.amends ? (
          <p>
            amends{' '}
            <Link className="link" to={paths.calibration.to({ id: run.amends.id })}>
              {run.amends.number}
            </Link>
          </p>
        ) : null}
        {run.recordHash ? <p className="run-hash">sha-256 {run.recordHash}</p> : null}
      </div>
    </div>
  );
}

import { useQuery } from '@tanstack/react-query';
import type { ChainReport } from '../../../../../shared/contracts/audit-events.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { formatCount } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { FailedFace } from '../../../components/ui/faces.tsx';
import { chainIntegrity } from '../api.ts';

/** Computes every hash again and says whether the chain still holds, with the last hash to compare elsewhere. */
export function IntegrityCheck() {
  const query = useQuery(chainIntegrity());
  return (
    <section className="integrity" aria-label="Integrity of the audit trail">
      <Button isPending={query.isFetching} onClick={() => query.refetch()}>
        {query.isFetching ? 'Checking every entry' : 'Check integrity'}
      </Button>
      <div role="status">
        {query.data ? <Report report={query.data} /> : null}
        {!query.data && !query.isFetching && !query.isError ? (
          <p className="text-ink-2">
            Computes the hash of every entry again and compares it with the one stored.
          </p>
        ) : null}
      </div>
      {query.isError ? (
        <FailedFace
          title="The check could not be made."
          error={query.error}
          onRetry={() => query.refetch()}
        />
      ) : null}
    </section>
  );
}

function Report({ report }: { report: ChainReport }) {
  const at = formatDateTime(report.checkedAt, { seconds: true, offset: true });
  return (
    <>
      {report.isUnbroken ? (
        <p>
          <b>The chain is unbroken</b>: {formatCount(report.events, 'entry', 'entries')}, checked {at}.
        </p>
      ) : (
        <p className="is-stop">
          The chain is broken at entry {report.firstBreak?.sequence}: {report.firstBreak?.what} Checked {at}.
          Tell whoever looks after the database, and keep this page.
        </p>
      )}
      <p className="integrity-hash">
        last hash <code>{report.lastHash}</code>
      </p>
    </>
  );
}

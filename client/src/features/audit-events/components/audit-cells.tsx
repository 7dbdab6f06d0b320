import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { AuditEventView } from '../../../../../shared/contracts/audit-events.ts';
import { formatDate, formatTime } from '../../../../../shared/format/dates.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { Button } from '../../../components/ui/button.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow } from '../../../components/ui/ledger-parts.tsx';
import { paths } from '../../../paths.ts';
import type { FieldChange } from '../model.ts';
import { actorWords, deedWords, fieldChanges, receivedLater } from '../model.ts';

export const AUDIT_COLUMNS: LedgerColumn<AuditEventView>[] = [
  { key: 'at', head: 'When, UTC', width: '150px', cell: (event) => <When event={event} /> },
  {
    key: 'who',
    head: 'Who, acting as',
    width: '190px',
    cell: (event) => <NameCell isSmall name={event.actorName} note={actorWords(event)} />,
  },
  { key: 'what', head: 'What', width: 'minmax(180px, .9fr)', cell: (event) => <Deed event={event} /> },
  {
    key: 'changes',
    head: 'Before → after',
    width: 'minmax(240px, 1.6fr)',
    cell: (event) => <Changes event={event} />,
  },
  {
    key: 'reason',
    head: 'Reason',
    width: 'minmax(140px, .9fr)',
    cell: (event) => <span className="cell-say">{event.reason ?? ''}</span>,
  },
];

function When({ event }: { event: AuditEventView }) {
  const later = receivedLater(event);
  return (
    <span title={`Entry ${event.sequence}, hash ${event.hash}`}>
      <NameCell
        isSmall
        name={formatDate(event.capturedAt)}
        note={formatTime(event.capturedAt, { seconds: true })}
      />
      {later ? <small className="audit-later">received {later}</small> : null}
    </span>
  );
}

/** Pages of the things that events are about. */
const PAGES: Readonly<Record<string, (id: string) => string>> = {
  probes: (id) => paths.probe.to({ id }),
  points: (id) => paths.point.to({ id }),
  standards: (id) => paths.standard.to({ id }),
  sites: (id) => paths.site.to({ id }),
  users: (id) => paths.person.to({ id }),
  quarantine: (id) => paths.quarantinedMessage.to({ id }),
};

function Deed({ event }: { event: AuditEventView }) {
  const words = capitalise(deedWords(event));
  const page = event.objectId === null ? undefined : PAGES[event.objectKind]?.(event.objectId);
  return (
    <span className="cell-say">
      {page && !event.action.startsWith('sessions.') ? (
        <Link className="link" to={page}>
          {words}
        </Link>
      ) : (
        words
      )}
      {event.objectVersion === null ? null : <small>version {event.objectVersion}</small>}
    </span>
  );
}

/** Changes shown before somebody asks for the rest. */
const FIRST = 3;

function Changes({ event }: { event: AuditEventView }) {
  const [isWhole, setIsWhole] = useState(false);
  const changes = fieldChanges(event.oldValue, event.newValue);
  if (changes.length === 0) return null;
  const shown = isWhole ? changes : changes.slice(0, FIRST);
  return (
    <>
      <dl className="changes">
        {shown.map((change) => (
          <div key={change.field}>
            <dt>{change.field}</dt>
            <dd>
              <ChangedValue {...change} />
            </dd>
          </div>
        ))}
      </dl>
      {changes.length > FIRST ? (
        <Button kind="quiet" aria-expanded={isWhole} onClick={() => setIsWhole(!isWhole)}>
          {isWhole ? 'Show fewer' : `Show all ${changes.length}`}
        </Button>
      ) : null}
    </>
  );
}

function ChangedValue({ from, to }: FieldChange) {
  if (to === null) return <span className="is-faint">{from}, before</span>;
  return (
    <>
      {from === null ? null : (
        <>
          <del>{from}</del>
          <span aria-hidden="true"> → </span>
          <span className="sr-only"> became </span>
        </>
      )}
      <ins>{to}</ins>
    </>
  );
}

export function AuditPhoneRow({ event }: { event: AuditEventView }) {
  return (
    <PhoneRow
      name={<NameCell name={event.actorName} note={actorWords(event)} />}
      value={<When event={event} />}
      more={
        <div className="audit-more">
          <Deed event={event} />
          <Changes event={event} />
          {event.reason ? <p className="cell-say">Reason: {event.reason}</p> : null}
        </div>
      }
    />
  );
}

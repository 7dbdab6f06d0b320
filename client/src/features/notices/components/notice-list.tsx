import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Notice } from '../../../../../shared/contracts/notices.ts';
import { capitalise, NOTICE_LABELS } from '../../../../../shared/format/labels.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { VisuallyHidden } from '../../../components/ui/visually-hidden.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { paths } from '../../../paths.ts';
import { openNotices, useCloseNotice } from '../api.ts';

/** What devices sent that was used but does not fit together, until somebody has closed it. */
export function NoticeList() {
  const query = useQuery(openNotices());
  const [closing, setClosing] = useState<Notice | null>(null);
  const closeButton = (notice: Notice) =>
    notice.can.close ? (
      <Button
        kind="quiet"
        aria-label={`Close the notice about ${notice.probeTag ?? notice.deviceName ?? 'a device'}`}
        onClick={() => setClosing(notice)}
      >
        Close…
      </Button>
    ) : null;
  return (
    <section className="mt-10">
      <SectionTitle note="messages that were used but do not fit together">Integrity notices</SectionTitle>
      <Answer
        query={query}
        what="the notices"
        loading={<LoadingFace label="Fetching the notices" rows={2} />}
      >
        {({ items }) => (
          <Ledger
            label="Integrity notices"
            columns={columnsFor(closeButton)}
            rows={items}
            rowKey={(notice) => notice.id}
            isHeadSticky={false}
            phone={(notice) => (
              <PhoneRow
                name={<Who notice={notice} />}
                value={closeButton(notice)}
                more={<What notice={notice} />}
              />
            )}
            empty={
              <EmptyFace title="No open notice.">
                What devices send fits together, or somebody has closed what did not.
              </EmptyFace>
            }
          />
        )}
      </Answer>
      {closing ? <CloseNoticeDialog notice={closing} onClose={() => setClosing(null)} /> : null}
    </section>
  );
}

function columnsFor(closeButton: (notice: Notice) => React.ReactNode): LedgerColumn<Notice>[] {
  return [
    { key: 'who', head: 'Probe and time, UTC', width: '220px', cell: (notice) => <Who notice={notice} /> },
    {
      key: 'what',
      head: 'What does not fit',
      width: 'minmax(240px, 1fr)',
      cell: (notice) => <What notice={notice} />,
    },
    {
      key: 'close',
      head: <VisuallyHidden>Close</VisuallyHidden>,
      width: '90px',
      align: 'end',
      cell: closeButton,
    },
  ];
}

function Who({ notice }: { notice: Notice }) {
  const name =
    notice.probeId === null ? (
      (notice.deviceName ?? 'device not known')
    ) : (
      <Link className="link" to={paths.probe.to({ id: notice.probeId })}>
        {notice.probeTag}
      </Link>
    );
  return <NameCell name={name} note={<Time at={notice.at} />} />;
}

function What({ notice }: { notice: Notice }) {
  const label = capitalise(NOTICE_LABELS[notice.kind]);
  // Without figures of its own the text only says the label again.
  const hasMore = notice.text.replace(/\.$/, '').toLowerCase() !== label.toLowerCase();
  return (
    <span className="cell-say">
      <b>{label}</b>
      {hasMore ? <small>{notice.text}</small> : null}
    </span>
  );
}

function CloseNoticeDialog({ notice, onClose }: { notice: Notice; onClose: () => void }) {
  const close = useCloseNotice(notice.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title="Close this notice?"
      sentence={`${capitalise(NOTICE_LABELS[notice.kind])}. Closing it says that somebody knows why.`}
      confirmLabel="Close notice"
      asksReason
      reasonHint="What was found. Kept in the audit trail with your name."
      onConfirm={async (reason) => {
        await close.mutateAsync(reason);
        say('The notice is closed.');
      }}
    />
  );
}

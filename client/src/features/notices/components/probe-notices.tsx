import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Notice } from '../../../../../shared/contracts/notices.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { capitalise, NOTICE_LABELS } from '../../../../../shared/format/labels.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Caution } from '../../../components/ui/caution.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { openNotices, useCloseNotice } from '../api.ts';

/** What the device has sent that does not fit together, until somebody has looked at it. Nothing when there is none. */
export function ProbeNotices({ probeId, timeZone }: { probeId: number; timeZone: string }) {
  const query = useQuery(openNotices());
  const notices = (query.data?.items ?? []).filter((notice) => notice.probeId === probeId);
  return notices.map((notice) => <OpenNotice key={notice.id} notice={notice} timeZone={timeZone} />);
}

function OpenNotice({ notice, timeZone }: { notice: Notice; timeZone: string }) {
  const [isClosing, setIsClosing] = useState(false);
  const close = useCloseNotice(notice.id);
  return (
    <div className="probe-notice">
      <Caution>
        <b>{capitalise(NOTICE_LABELS[notice.kind])}.</b> {moreThanLabel(notice)}{' '}
        {formatDateTime(notice.at, { timeZone, offset: true })}.{' '}
        {notice.can.close ? (
          <Button kind="quiet" onClick={() => setIsClosing(true)}>
            Close…
          </Button>
        ) : null}
      </Caution>
      <ConfirmDialog
        isOpen={isClosing}
        onClose={() => setIsClosing(false)}
        title="Close this notice?"
        sentence="Say what was found. The notice leaves this page and stays in the records."
        confirmLabel="Close notice"
        asksReason
        onConfirm={(reason) => close.mutateAsync(reason)}
      />
    </div>
  );
}

/** What the notice says beyond its kind; some kinds are the whole message. */
function moreThanLabel({ kind, text }: Notice): string {
  const plain = (words: string) => words.toLowerCase().replace(/\.$/, '');
  return plain(text) === plain(NOTICE_LABELS[kind]) ? '' : text;
}

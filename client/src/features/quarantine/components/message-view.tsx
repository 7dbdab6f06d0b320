import { useMemo, useState } from 'react';
import type { QuarantinedMessage } from '../../../../../shared/contracts/quarantine.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { QUARANTINE_LABELS } from '../../../../../shared/format/labels.ts';
import { formatBytes } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { paths } from '../../../paths.ts';
import { useResolveMessage } from '../api.ts';
import { bytesOf, rawParts } from '../model.ts';

/** One message that could not be used: why, from where, and exactly what came. */
export function MessageView({ message }: { message: QuarantinedMessage }) {
  const [isResolving, setIsResolving] = useState(false);
  const resolve = useResolveMessage(message.id);
  const say = useToast();
  return (
    <>
      <Crumbs items={[{ label: 'Quarantine', to: paths.quarantine.to() }]} />
      <PageHead
        name={`Message ${message.id}`}
        sentence={
          <>
            Set aside because it was <b>{QUARANTINE_LABELS[message.code]}</b>.{' '}
            {message.resolvedAt ? 'Somebody has dealt with it.' : 'It waits for somebody.'}
          </>
        }
        aside={
          message.can.resolve ? (
            <div className="page-buttons">
              <Button kind="primary" onClick={() => setIsResolving(true)}>
                Mark as dealt with…
              </Button>
            </div>
          ) : null
        }
      />
      <div className="two-columns">
        <section>
          <SectionTitle note="as it came; bytes that print nothing are hexadecimal">Raw message</SectionTitle>
          <RawMessage base64={message.payloadBase64} wholeBytes={message.payloadBytes} />
        </section>
        <div>
          <section>
            <SectionTitle>What is known</SectionTitle>
            <DefinitionList
              items={[
                {
                  term: 'Received',
                  value: formatDateTime(message.receivedAt, { seconds: true, offset: true }),
                },
                { term: 'Device', value: message.deviceName ?? 'not known' },
                { term: 'Topic', value: message.topic },
                { term: 'Size', value: formatBytes(message.payloadBytes) },
                { term: 'Code', value: message.code },
                { term: 'Reason', value: message.reason },
                ...(message.resolvedAt
                  ? [
                      { term: 'Dealt with', value: formatDateTime(message.resolvedAt, { offset: true }) },
                      { term: 'What was done', value: message.resolution },
                    ]
                  : []),
              ]}
            />
          </section>
        </div>
      </div>
      <ConfirmDialog
        isOpen={isResolving}
        onClose={() => setIsResolving(false)}
        title="Mark this message as dealt with?"
        sentence="It leaves the list of what waits and stays readable for good. Its content is not used."
        confirmLabel="Mark as dealt with"
        asksReason
        reasonHint="What was the cause, and what was done. Kept in the audit trail with your name."
        onConfirm={async (reason) => {
          await resolve.mutateAsync(reason);
          say(`Message ${message.id} is dealt with.`);
        }}
      />
    </>
  );
}

function RawMessage({ base64, wholeBytes }: { base64: string; wholeBytes: number }) {
  const bytes = useMemo(() => bytesOf(base64), [base64]);
  const parts = useMemo(() => rawParts(bytes), [bytes]);
  if (parts.length === 0) return <p className="text-ink-2">The message was empty.</p>;
  return (
    <>
      <pre className="raw-message" tabIndex={0} aria-label="Raw message">
        {parts.map((part, i) =>
          part.kind === 'text' ? (
            part.text
          ) : (
            <mark key={i} title="bytes, hexadecimal">{`⟨${part.text}⟩`}</mark>
          ),
        )}
      </pre>
      {bytes.length < wholeBytes ? (
        <p className="ledger-foot">
          The first {formatBytes(bytes.length)} are kept; the message had {formatBytes(wholeBytes)}.
        </p>
      ) : null}
    </>
  );
}

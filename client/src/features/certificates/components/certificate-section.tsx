import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import {
  certificateMediaTypes,
  largestCertificateBytes,
  type Certificate,
} from '../../../../../shared/contracts/certificates.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { formatBytes } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { certificateFile, useAttachCertificate, type CertificateHolder } from '../api.ts';

export interface CertificateSectionProps {
  certificate: Certificate | null;
  holder: CertificateHolder;
  id: number;
  /** Code of the lot or instrument, for the sentences. */
  code: string;
  canAttach: boolean;
}

/** The certificate file of a lot or an instrument: open it, or attach one. */
export function CertificateSection({ certificate, holder, id, code, canAttach }: CertificateSectionProps) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <section>
      <SectionTitle>Certificate file</SectionTitle>
      {certificate ? (
        <div className="file-line">
          <a className="link" href={certificateFile(certificate.id)} download={certificate.fileName}>
            {certificate.fileName}
          </a>
          <p>
            {formatBytes(certificate.byteCount)}, added {formatDate(certificate.uploadedAt)} by{' '}
            {certificate.uploadedBy}
          </p>
          <p className="file-hash" title="SHA-256 of the file as received">
            SHA-256 {certificate.sha256}
          </p>
        </div>
      ) : (
        <p className="text-ink-2">No file is attached yet. An auditor will ask for it.</p>
      )}
      {canAttach ? (
        <Button className="mt-3" onClick={() => setIsOpen(true)}>
          {certificate ? 'Attach another file…' : 'Attach the certificate…'}
        </Button>
      ) : null}
      {isOpen ? (
        <AttachDialog
          holder={holder}
          id={id}
          code={code}
          isAnother={certificate !== null}
          onClose={() => setIsOpen(false)}
        />
      ) : null}
    </section>
  );
}

interface AttachDialogProps extends Pick<CertificateSectionProps, 'holder' | 'id' | 'code'> {
  isAnother: boolean;
  onClose: () => void;
}

function AttachDialog({ holder, id, code, isAnother, onClose }: AttachDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [file, setFile] = useState<File | null>(null);
  const [reason, setReason] = useState(isAnother ? '' : 'Certificate received with the delivery');
  const attach = useAttachCertificate(holder, id);
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const issues = {
      file:
        file === null
          ? 'Choose the file.'
          : file.size > largestCertificateBytes
            ? 'The file is larger than 10 MB. Scan it with fewer dots per inch.'
            : undefined,
      reason: reason.trim().length < 3 ? 'Write the reason in a few words.' : undefined,
    };
    const isDone = await submit(() => attach.mutateAsync({ file: file!, reason }), issues);
    if (!isDone) return;
    say(`The certificate is attached to ${code}.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Attach a certificate to ${code}`}
      sentence="The file is kept as it is, with its hash. It can be replaced, never changed; the one before stays in the audit trail."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Attach file
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
        <Field label="File" hint="PDF, PNG or JPEG, at most 10 MB." error={issueFor('file')}>
          <TextInput
            type="file"
            accept={certificateMediaTypes.join(',')}
            onChange={(event) => setFile(event.target.files?.[0] ?? null)}
          />
        </Field>
        <Field label="Reason" hint="Kept in the audit trail with your name." error={issueFor('reason')}>
          <TextInput value={reason} maxLength={1000} onChange={(event) => setReason(event.target.value)} />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}

import type { ReactNode } from 'react';
import type { Mail } from '../../../../../shared/contracts/mails.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { mailState, textWithLinks } from '../model.ts';

/** One mail as its reader gets it: plain text, addresses to follow. */
export function MailText({ mail, closeButton }: { mail: Mail; closeButton: ReactNode }) {
  return (
    <article aria-label={mail.subject}>
      <SectionTitle>{mail.subject}</SectionTitle>
      <DefinitionList
        items={[
          { term: 'To', value: mail.to },
          { term: 'Written', value: formatDateTime(mail.createdAt, { offset: true }) },
          { term: 'State', value: capitalise(mailState(mail).text) },
        ]}
      />
      <div className="mail-text">
        {textWithLinks(mail.textBody).map((part, i) =>
          part.href ? (
            <a key={i} className="link" href={part.href} rel="noreferrer">
              {part.text}
            </a>
          ) : (
            part.text
          ),
        )}
      </div>
      {closeButton}
    </article>
  );
}

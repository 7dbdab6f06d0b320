import { useState } from 'react';
import type { Session } from '../../../../../shared/contracts/sessions.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { ThemeToggle } from '../../../components/ui/theme-toggle.tsx';
import { Age } from '../../../components/ui/time.tsx';
import { useSignOut } from '../api.ts';
import { grantWords } from '../model.ts';
import { ChangePasswordForm } from './change-password-form.tsx';

/** Who one is here, one's password, one's open sessions, and how this device shows the page. */
export function Account({ session }: { session: Session }) {
  const { user, grants, startedAt } = session;
  return (
    <>
      <PageHead
        name="Your account"
        sentence={
          <>
            You are signed in as <b>{user.name}</b>. Everything you change is kept under this name.
          </>
        }
      />
      <div className="account">
        <section>
          <SectionTitle>Who you are here</SectionTitle>
          <DefinitionList
            items={[
              { term: 'Name', value: user.name },
              { term: 'E-mail', value: user.email },
              { term: 'Signed in', value: <Age at={startedAt} /> },
              {
                term: 'Roles',
                value: (
                  <ul>
                    {grants.map((grant) => (
                      <li key={`${grant.siteId}-${grant.role}`}>{capitalise(grantWords(grant))}</li>
                    ))}
                  </ul>
                ),
              },
            ]}
          />
          <div className="mt-6 max-w-90">
            <ThemeToggle />
          </div>
          <SignOutEverywhere />
        </section>
        <section>
          <SectionTitle>Change your password</SectionTitle>
          <ChangePasswordForm />
        </section>
      </div>
    </>
  );
}

function SignOutEverywhere() {
  const [isOpen, setIsOpen] = useState(false);
  const signOut = useSignOut();
  return (
    <div className="mt-6">
      <Button onClick={() => setIsOpen(true)}>Sign out everywhere…</Button>
      <ConfirmDialog
        isOpen={isOpen}
        onClose={() => setIsOpen(false)}
        title="Sign out everywhere?"
        sentence="Every browser and phone where you are signed in is signed out at once, this one included."
        confirmLabel="Sign out everywhere"
        onConfirm={() => signOut.mutateAsync({ isEverywhere: true })}
      />
    </div>
  );
}

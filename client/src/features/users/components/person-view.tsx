import type { ReactNode } from 'react';
import { useState } from 'react';
import type { User } from '../../../../../shared/contracts/users.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { useNow } from '../../../components/ui/time.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useDeactivateUser, useInviteAgain, useUnlockUser } from '../api.ts';
import { personState } from '../model.ts';
import { ChangePersonDialog } from './change-person-dialog.tsx';

export interface PersonViewProps {
  user: User;
  /** The roles of the person, as their own slice shows them. */
  grants: ReactNode;
}

/** One person: whether sign-in works, the roles, and what an administrator can do about either. */
export function PersonView({ user, grants }: PersonViewProps) {
  const state = personState(user, useNow());
  return (
    <>
      <PageHead
        name={user.name}
        sentence={
          <>
            {user.email}. {state.isNotable ? <b>{capital(state.text)}.</b> : `${capital(state.text)}.`}
          </>
        }
        aside={<PersonActions user={user} />}
      />
      <div className="two-columns">
        <div>{grants}</div>
        <div>
          <section>
            <SectionTitle>Sign-in</SectionTitle>
            <DefinitionList
              items={[
                { term: 'E-mail', value: user.email },
                { term: 'Password', value: user.hasPassword ? 'set' : 'not set yet' },
                {
                  term: 'Signed in last',
                  value: user.lastSignInAt ? formatDateTime(user.lastSignInAt, { offset: true }) : 'never',
                },
                {
                  term: 'Locked until',
                  value: user.lockedUntil ? formatDateTime(user.lockedUntil, { offset: true }) : 'not locked',
                },
              ]}
            />
          </section>
        </div>
      </div>
    </>
  );
}

function PersonActions({ user }: { user: User }) {
  const [open, setOpen] = useState<'change' | 'deactivate' | 'unlock' | 'invite' | null>(null);
  const close = () => setOpen(null);
  const { can } = user;
  const isActive = user.deactivatedAt === null;
  return (
    <div className="page-buttons">
      {can.change && isActive ? <Button onClick={() => setOpen('change')}>Change…</Button> : null}
      {can.change && isActive ? (
        <Button onClick={() => setOpen('invite')}>
          {user.hasPassword ? 'Mail a new password link…' : 'Invite again…'}
        </Button>
      ) : null}
      {can.unlock ? <Button onClick={() => setOpen('unlock')}>Unlock…</Button> : null}
      {can.deactivate ? (
        <Button kind="danger" onClick={() => setOpen('deactivate')}>
          Deactivate…
        </Button>
      ) : null}
      {open === 'change' ? <ChangePersonDialog user={user} onClose={close} /> : null}
      {open === 'invite' ? <InviteDialog user={user} onClose={close} /> : null}
      {open === 'unlock' ? <UnlockDialog user={user} onClose={close} /> : null}
      {open === 'deactivate' ? <DeactivateDialog user={user} onClose={close} /> : null}
    </div>
  );
}

interface DialogProps {
  user: User;
  onClose: () => void;
}

function InviteDialog({ user, onClose }: DialogProps) {
  const invite = useInviteAgain(user.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Mail ${user.name} a link?`}
      sentence="The link sets a new password, works once and runs out. Earlier links stop working."
      confirmLabel="Mail the link"
      onConfirm={async () => {
        await invite.mutateAsync();
        say(`A link is on its way to ${user.email}.`);
      }}
    />
  );
}

function UnlockDialog({ user, onClose }: DialogProps) {
  const unlock = useUnlockUser(user.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Unlock ${user.name}?`}
      sentence="Sign-in was locked after repeated wrong passwords. Make sure it was the person who tried."
      confirmLabel="Unlock"
      onConfirm={async () => {
        await unlock.mutateAsync();
        say(`${user.name} can sign in again.`);
      }}
    />
  );
}

function DeactivateDialog({ user, onClose }: DialogProps) {
  const deactivate = useDeactivateUser(user.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Deactivate ${user.name}?`}
      sentence="Signed out everywhere at once, and cannot sign in again. Everything done under this name stays. This cannot be undone."
      confirmLabel="Deactivate"
      isDanger
      asksReason
      onConfirm={async (reason) => {
        await deactivate.mutateAsync({ reason, version: user.version });
        say(`${user.name} is deactivated.`);
      }}
    />
  );
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

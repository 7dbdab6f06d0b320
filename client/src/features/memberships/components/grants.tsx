import { useState } from 'react';
import type { User } from '../../../../../shared/contracts/users.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { capitalise, ROLE_LABELS, ROLE_TASKS } from '../../../../../shared/format/labels.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { EmptyFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { useNow } from '../../../components/ui/time.tsx';
import { VisuallyHidden } from '../../../components/ui/visually-hidden.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useEndGrant } from '../api.ts';
import { GrantRoleDialog } from './grant-role-dialog.tsx';

type Grant = User['grants'][number];

export interface GrantsProps {
  user: User;
  sites: readonly { id: number; name: string }[];
}

/** The roles of one person; each is given and ended with a reason. */
export function Grants({ user, sites }: GrantsProps) {
  const [isGranting, setIsGranting] = useState(false);
  const [ending, setEnding] = useState<Grant | null>(null);
  const today = new Date(useNow()).toISOString().slice(0, 10);
  const mayChange = user.can.change && user.deactivatedAt === null;
  const endButton = (grant: Grant) =>
    mayChange ? (
      <Button kind="quiet" aria-label={`End ${words(grant)}`} onClick={() => setEnding(grant)}>
        End…
      </Button>
    ) : null;
  return (
    <section>
      <SectionTitle note="one role per site; a role at all sites counts where no other is given">
        Roles
      </SectionTitle>
      <Ledger
        label={`Roles of ${user.name}`}
        columns={columnsFor(today, endButton)}
        rows={user.grants}
        rowKey={(grant) => grant.id}
        isHeadSticky={false}
        phone={(grant) => (
          <PhoneRow
            name={<NameCell name={capitalise(ROLE_LABELS[grant.role])} note={where(grant)} />}
            value={endButton(grant)}
            trust={<Until grant={grant} today={today} />}
          />
        )}
        empty={
          <EmptyFace title="No role yet.">
            Without a role at a site or at all sites, sign-in is refused.
          </EmptyFace>
        }
      />
      {mayChange ? (
        <div className="mt-5">
          <Button kind="primary" onClick={() => setIsGranting(true)}>
            Give a role…
          </Button>
        </div>
      ) : null}
      {isGranting ? <GrantRoleDialog user={user} sites={sites} onClose={() => setIsGranting(false)} /> : null}
      {ending ? <EndGrantDialog user={user} grant={ending} onClose={() => setEnding(null)} /> : null}
    </section>
  );
}

const where = (grant: Grant) =>
  grant.siteId === null ? 'all sites' : (grant.siteName ?? `site ${grant.siteId}`);
const words = (grant: Grant) => `${ROLE_LABELS[grant.role]}, ${where(grant)}`;

function columnsFor(today: string, endButton: (grant: Grant) => React.ReactNode): LedgerColumn<Grant>[] {
  return [
    {
      key: 'role',
      head: 'Role',
      width: 'minmax(220px, 1.6fr)',
      cell: (grant) => <NameCell name={capitalise(ROLE_LABELS[grant.role])} note={ROLE_TASKS[grant.role]} />,
    },
    {
      key: 'where',
      head: 'Where',
      width: 'minmax(120px, 1fr)',
      cell: (grant) => <span className="cell-mono">{where(grant)}</span>,
    },
    {
      key: 'until',
      head: 'Until',
      width: 'minmax(130px, .8fr)',
      cell: (grant) => <Until grant={grant} today={today} />,
    },
    { key: 'end', head: <VisuallyHidden>End</VisuallyHidden>, width: '70px', align: 'end', cell: endButton },
  ];
}

function Until({ grant, today }: { grant: Grant; today: string }) {
  if (!grant.endsOn) return <span className="cell-say">ended by hand only</span>;
  const isOver = grant.endsOn < today;
  return (
    <span className={isOver ? 'cell-say is-care' : 'cell-mono'}>
      {isOver ? 'over since ' : ''}
      {formatDate(grant.endsOn)}
    </span>
  );
}

interface EndGrantDialogProps {
  user: User;
  grant: Grant;
  onClose: () => void;
}

function EndGrantDialog({ user, grant, onClose }: EndGrantDialogProps) {
  const end = useEndGrant(grant.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`End this role of ${user.name}?`}
      sentence={`${capitalise(words(grant))}. Open pages lose these rights at once.`}
      confirmLabel="End role"
      isDanger
      asksReason
      onConfirm={async (reason) => {
        await end.mutateAsync(reason);
        say(`${user.name} is no longer ${words(grant)}.`);
      }}
    />
  );
}

import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { User } from '../../../../../shared/contracts/users.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { usersList } from '../api.ts';
import { grantWords, peopleSentence, personState } from '../model.ts';

/** Who may sign in, in which role, where, and until when. */
export function PeopleList({ addLink }: { addLink: ReactNode }) {
  const query = useQuery(usersList());
  // The moment the answer came: states must not flicker while the clock goes on.
  const now = query.dataUpdatedAt;
  const sentence = query.data ? peopleSentence(query.data.items, now) : null;
  return (
    <>
      <PageHead
        name="People"
        sentence={
          sentence ? (
            <>
              {sentence.all} <b>{sentence.exception}</b>
            </>
          ) : (
            'Rights belong to a person and a site.'
          )
        }
        aside={addLink}
      />
      <Answer query={query} what="the people" loading={<LoadingFace label="Fetching the people" rows={8} />}>
        {({ items }) => (
          <Ledger
            label="People"
            columns={columnsFor(now)}
            rows={items}
            rowKey={(user) => user.id}
            rowHref={(user) => paths.person.to({ id: user.id })}
            phone={(user) => (
              <PhoneRow
                name={
                  <RowLink to={paths.person.to({ id: user.id })}>
                    <NameCell name={user.name} note={user.email} />
                  </RowLink>
                }
                trust={<Roles user={user} now={now} />}
                more={<State user={user} now={now} />}
              />
            )}
            empty={
              <EmptyFace title="Nobody is here yet." actions={addLink}>
                Add a person, then give a role at a site or at all sites.
              </EmptyFace>
            }
          />
        )}
      </Answer>
    </>
  );
}

function columnsFor(now: number): LedgerColumn<User>[] {
  return [
    {
      key: 'name',
      head: 'Person',
      width: 'minmax(220px, 1fr)',
      cell: (user) => <NameCell name={user.name} note={user.email} />,
    },
    {
      key: 'roles',
      head: 'Roles',
      width: 'minmax(220px, 1.2fr)',
      cell: (user) => <Roles user={user} now={now} />,
    },
    {
      key: 'state',
      head: 'State',
      width: 'minmax(220px, 1.2fr)',
      cell: (user) => <State user={user} now={now} />,
    },
  ];
}

function Roles({ user, now }: { user: User; now: number }) {
  const today = new Date(now).toISOString().slice(0, 10);
  if (user.grants.length === 0) return <span className="cell-say">none</span>;
  return (
    <ul className="cell-say">
      {user.grants.map((grant) => (
        <li key={grant.id}>{grantWords(grant, today)}</li>
      ))}
    </ul>
  );
}

function State({ user, now }: { user: User; now: number }) {
  const { text, isNotable } = personState(user, now);
  return <span className={isNotable ? 'cell-say is-care' : 'cell-say'}>{text}</span>;
}

import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { Site } from '../../../../../shared/contracts/sites.ts';
import { capitalise, listInWords } from '../../../../../shared/format/labels.ts';
import { countInWords, formatCount, formatNumber } from '../../../../../shared/format/numbers.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { sitesList } from '../api.ts';

const count = (value: number) => <span className="cell-mono">{formatNumber(value, { decimals: 0 })}</span>;

const COLUMNS: LedgerColumn<Site>[] = [
  {
    key: 'name',
    head: 'Site',
    width: 'minmax(180px, 1fr)',
    cell: (site) => <NameCell name={site.name} note={site.code} />,
  },
  {
    key: 'areas',
    head: 'Areas',
    width: 'minmax(200px, 2fr)',
    cell: (site) => (
      <span className="cell-say">{listInWords(site.areas.map((area) => area.name)) || 'none yet'}</span>
    ),
  },
  {
    key: 'zone',
    head: 'Time zone',
    width: '190px',
    cell: (site) => <span className="cell-mono">{site.timeZone}</span>,
  },
  { key: 'points', head: 'Points', width: '90px', align: 'end', cell: (site) => count(site.pointCount) },
  { key: 'probes', head: 'Probes', width: '90px', align: 'end', cell: (site) => count(site.probeCount) },
];

/** The sites one may see. `addLink` for those who may add one. */
export function SiteList({ addLink }: { addLink: ReactNode }) {
  const query = useQuery(sitesList());
  const total = query.data?.items.length;
  return (
    <>
      <PageHead
        name="Sites"
        sentence={
          total === undefined
            ? 'Fetching the sites.'
            : `${capitalise(total === 1 ? 'one' : countInWords(total))} ${total === 1 ? 'site' : 'sites'}. Points, probes and rights belong to a site; its time zone dates what is read there.`
        }
        aside={addLink}
      />
      <Answer query={query} what="the sites" loading={<LoadingFace label="Fetching the sites" rows={4} />}>
        {({ items }) => (
          <Ledger
            label="Sites"
            columns={COLUMNS}
            rows={items}
            rowKey={(site) => site.id}
            rowHref={(site) => paths.site.to({ id: site.id })}
            phone={(site) => (
              <PhoneRow
                name={
                  <RowLink to={paths.site.to({ id: site.id })}>
                    <NameCell name={site.name} note={`${site.code} · ${site.timeZone}`} />
                  </RowLink>
                }
                trust={
                  <span className="cell-say">
                    {formatCount(site.areas.length, 'area')}, {formatCount(site.pointCount, 'point')},{' '}
                    {formatCount(site.probeCount, 'probe')}
                  </span>
                }
              />
            )}
            empty={
              <EmptyFace title="No site is set up yet." actions={addLink}>
                A site has areas, areas have measuring points, and probes are installed at points.
              </EmptyFace>
            }
          />
        )}
      </Answer>
    </>
  );
}

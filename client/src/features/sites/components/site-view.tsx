import { useState } from 'react';
import type { Area, Site } from '../../../../../shared/contracts/sites.ts';
import { countInWords, formatCount, formatNumber } from '../../../../../shared/format/numbers.ts';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { EmptyFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { VisuallyHidden } from '../../../components/ui/visually-hidden.tsx';
import { paths } from '../../../paths.ts';
import { AddAreaForm, RenameAreaDialog } from './area-forms.tsx';
import { ChangeSiteDialog } from './change-site-dialog.tsx';

/** One site: its areas, and the way to its points and probes. */
export function SiteView({ site }: { site: Site }) {
  const [isChanging, setIsChanging] = useState(false);
  const [renaming, setRenaming] = useState<Area | null>(null);
  const { can } = site;
  return (
    <>
      <PageHead
        name={site.name}
        sentence={`${formatCount(site.pointCount, 'measuring point')} in ${site.areas.length === 1 ? 'one area' : `${countInWords(site.areas.length)} areas`}, ${formatCount(site.probeCount, 'probe')} kept here.`}
        aside={
          can.change ? (
            <div className="page-buttons">
              <Button onClick={() => setIsChanging(true)}>Change…</Button>
            </div>
          ) : null
        }
      />
      <div className="two-columns">
        <section>
          <SectionTitle note="in the order in which people walk">Areas</SectionTitle>
          <Ledger
            label={`Areas of ${site.name}`}
            columns={areaColumns(site, setRenaming)}
            rows={site.areas}
            rowKey={(area) => area.id}
            rowHref={(area) => paths.points.to({ siteId: site.id, q: area.name })}
            isHeadSticky={false}
            empty={
              <EmptyFace title="No area yet.">
                An area is a part of the plant: a hall, a line, a pond. Points belong to areas.
              </EmptyFace>
            }
          />
          {can.addArea ? <AddAreaForm siteId={site.id} /> : null}
        </section>
        <div>
          <section>
            <SectionTitle>Site</SectionTitle>
            <DefinitionList
              items={[
                { term: 'Code', value: site.code },
                { term: 'Time zone', value: site.timeZone },
              ]}
            />
            <div className="form-actions mt-5">
              <ButtonLink to={paths.liveSite.to({ siteId: site.id })}>Live readings</ButtonLink>
              <ButtonLink to={paths.points.to({ siteId: site.id })}>Points</ButtonLink>
              <ButtonLink to={paths.probes.to({ siteId: site.id })}>Probes</ButtonLink>
              {can.addPoint && site.areas.length > 0 ? (
                <ButtonLink to={paths.newPoint.to({ siteId: site.id })}>Add a point</ButtonLink>
              ) : null}
              {can.registerProbe ? (
                <ButtonLink to={paths.newProbe.to({ siteId: site.id })}>Register a probe</ButtonLink>
              ) : null}
            </div>
          </section>
        </div>
      </div>
      {isChanging ? <ChangeSiteDialog site={site} onClose={() => setIsChanging(false)} /> : null}
      {renaming ? <RenameAreaDialog area={renaming} onClose={() => setRenaming(null)} /> : null}
    </>
  );
}

function areaColumns(site: Site, onRename: (area: Area) => void): LedgerColumn<Area>[] {
  const columns: (LedgerColumn<Area> | false)[] = [
    {
      key: 'name',
      head: 'Area',
      width: 'minmax(120px, 1fr)',
      cell: (area) => <NameCell name={area.name} />,
    },
    {
      key: 'points',
      head: 'Points',
      width: '80px',
      align: 'end',
      cell: (area) => <span className="cell-mono">{formatNumber(area.pointCount, { decimals: 0 })}</span>,
    },
    site.can.addArea && {
      key: 'rename',
      head: <VisuallyHidden>Rename</VisuallyHidden>,
      width: '100px',
      align: 'end',
      cell: (area) => (
        <Button kind="quiet" aria-label={`Rename ${area.name}`} onClick={() => onRename(area)}>
          Rename…
        </Button>
      ),
    },
  ];
  return columns.filter((column): column is LedgerColumn<Area> => column !== false);
}

import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { Criteria, Procedure } from '../../../../../shared/contracts/procedures.ts';
import { formatDate, formatDateTime } from '../../../../../shared/format/dates.ts';
import { capitalise, listInWords, PROBE_KIND_LABELS } from '../../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { CRITERIA_LABELS, PROCEDURE_STEPS } from '../../../../../shared/format/reference-labels.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { ButtonLink } from '../../../components/ui/button.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { procedureVersions } from '../api.ts';

/** One version of a procedure: its steps in order, the numbers a run is held to, and the versions before. */
export function ProcedureView({ procedure }: { procedure: Procedure }) {
  const keys = Object.keys(CRITERIA_LABELS) as (keyof Criteria)[];
  return (
    <>
      <Crumbs items={[{ label: 'Procedures', to: paths.procedures.to() }]} />
      <PageHead
        name={procedure.name}
        sentence={
          <>
            Version {procedure.version}, for{' '}
            {listInWords(procedure.probeKinds.map((kind) => PROBE_KIND_LABELS[kind]))} probes.{' '}
            {procedure.replacedAt ? (
              <b>Replaced on {formatDate(procedure.replacedAt)}.</b>
            ) : (
              `In force since ${formatDate(procedure.effectiveFrom)}.`
            )}
          </>
        }
        aside={
          procedure.can.change ? (
            <div className="page-buttons">
              <ButtonLink kind="primary" to={paths.issueProcedure.to({ id: procedure.id })}>
                Issue a new version
              </ButtonLink>
            </div>
          ) : undefined
        }
      />
      <div className="two-columns">
        <div>
          <section>
            <SectionTitle note="in this order; the server keeps it">Steps</SectionTitle>
            <ol className="step-list">
              {procedure.steps.map((step) => (
                <li key={step}>
                  <b>{PROCEDURE_STEPS[step].label}</b>
                  <span>{PROCEDURE_STEPS[step].purpose}</span>
                </li>
              ))}
            </ol>
          </section>
        </div>
        <div>
          <section>
            <SectionTitle>What a run is held to</SectionTitle>
            <DefinitionList
              items={keys.map((key) => {
                const { label, unit } = CRITERIA_LABELS[key];
                return {
                  term: label,
                  value: formatNumber(procedure.criteria[key], unit ? { unit } : {}),
                };
              })}
            />
          </section>
          <Versions procedure={procedure} />
        </div>
      </div>
    </>
  );
}

function Versions({ procedure }: { procedure: Procedure }) {
  const query = useQuery(procedureVersions(procedure.code));
  return (
    <section>
      <SectionTitle note="newest first">Versions</SectionTitle>
      <Answer
        query={query}
        what="the versions"
        loading={<LoadingFace label="Fetching the versions" rows={2} />}
      >
        {({ items }) => (
          <ul className="stands">
            {items.map((one) => (
              <li key={one.id}>
                <span>{formatDateTime(one.effectiveFrom)}</span>
                <span>
                  {one.id === procedure.id ? (
                    <b>version {one.version}, shown here</b>
                  ) : (
                    <Link className="link" to={paths.procedure.to({ id: one.id })}>
                      version {one.version}
                    </Link>
                  )}
                  <small>{one.changeReason ? capitalise(one.changeReason) : 'As installed'}</small>
                </span>
              </li>
            ))}
          </ul>
        )}
      </Answer>
    </section>
  );
}

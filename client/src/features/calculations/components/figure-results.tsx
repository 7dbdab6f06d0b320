import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useDeferredValue } from 'react';
import type { Figure } from '../../../../../shared/contracts/calculations.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { figuresFor } from '../api.ts';
import type { Calculator } from '../calculators.ts';
import type { Values } from '../model.ts';
import { figureText, missingFields, missingWords, uncertaintyWords } from '../model.ts';
import { Results } from './results.tsx';

export interface ResultsOfProps {
  calculator: Calculator;
  values: Values;
  /** The inputs, given what the server says about each of them. */
  children: (issueFor: (path: string) => string | undefined) => ReactNode;
}

/** Figures beside their inputs; those that cannot be given stand among them with the reason. */
export function FigureResults({ calculator, values, children }: ResultsOfProps) {
  const settled = useDeferredValue(values);
  const missing = missingFields(calculator.fields, settled);
  const body = missing.length > 0 ? null : calculator.body(settled);
  const query = useQuery(figuresFor(calculator.path, body));
  return (
    <Results query={query} waitsFor={missing.length > 0 ? missingWords(missing) : null} inputs={children}>
      {(calculation) => (
        <>
          {calculation.figures.length > 0 ? (
            <Ledger
              label="Results"
              columns={COLUMNS}
              rows={calculation.figures}
              rowKey={(figure) => `${figure.name} ${figure.unit}`}
              isHeadSticky={false}
              phone={(figure) => <FigurePhoneRow figure={figure} />}
            />
          ) : null}
          {calculation.refusals.length > 0 ? (
            <ul className="refusals">
              {calculation.refusals.map((refusal) => (
                <li key={refusal.name}>
                  <b>{refusal.name}: no figure.</b> {capitalise(refusal.why)}
                </li>
              ))}
            </ul>
          ) : null}
        </>
      )}
    </Results>
  );
}

const COLUMNS: LedgerColumn<Figure>[] = [
  {
    key: 'name',
    head: 'Result',
    width: 'minmax(180px, 1fr)',
    cell: (figure) => <NameCell name={figure.name} note={figure.note} />,
  },
  {
    key: 'value',
    head: 'Value and U',
    width: 'minmax(210px, .8fr)',
    cell: (figure) => <Value figure={figure} />,
  },
  {
    key: 'equation',
    head: 'Equation, range, source',
    width: 'minmax(200px, 1.1fr)',
    cell: (figure) => <Origin figure={figure} />,
  },
];

function Value({ figure }: { figure: Figure }) {
  const { value, uncertainty, unit } = figureText(figure);
  return (
    <span className="result-value">
      <b>{value}</b> {uncertainty === null ? null : `± ${uncertainty} `}
      <span className="result-unit">{unit}</span>
      <small>{uncertaintyWords(figure)}</small>
    </span>
  );
}

function Origin({ figure }: { figure: Figure }) {
  return (
    <span className="cell-say">
      {figure.equation}
      <small>{figure.range}</small>
      <small>{figure.source}</small>
    </span>
  );
}

function FigurePhoneRow({ figure }: { figure: Figure }) {
  return (
    <div className="result-phone">
      <p className="result-name">{figure.name}</p>
      <Value figure={figure} />
      {figure.note ? <p className="cell-say">{figure.note}</p> : null}
      <Origin figure={figure} />
    </div>
  );
}

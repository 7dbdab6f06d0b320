import { useEffect, useState } from 'react';
import { Field } from '../../../components/ui/field.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { Tabs } from '../../../components/ui/tabs.tsx';
import { oneOf, useAddressFilters } from '../../../lib/use-address-filters.ts';
import { useWidth } from '../../../lib/use-width.ts';
import type { CalculatorKind } from '../calculators.ts';
import { CALCULATORS } from '../calculators.ts';
import type { Values } from '../model.ts';
import { initialValues } from '../model.ts';
import type { LotOption } from './calculator-inputs.tsx';
import { CalculatorInputs } from './calculator-inputs.tsx';
import { FigureResults } from './figure-results.tsx';
import { PlanResults } from './plan-results.tsx';

/** Narrower, the tabs would need a second line: the choice is a select then, for one thumb. */
const TABS_PX = 900;
const KINDS = CALCULATORS.map((calculator) => calculator.kind);
const ALL_NAMES = [
  ...new Set(CALCULATORS.flatMap((calculator) => calculator.fields.map((field) => field.name))),
];

/** The bench calculator. What is typed stands in the address too: a reload or a link brings it back. */
export function BenchCalculator({ lots }: { lots: readonly LotOption[] }) {
  const { read, write } = useAddressFilters();
  const [kind, setKind] = useState<CalculatorKind>(() => oneOf(KINDS, read('calc')) ?? 'standard');
  const [all, setAll] = useState(() => startingValues(kind, read));
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  const calculator = CALCULATORS.find((one) => one.kind === kind) ?? CALCULATORS[0]!;
  const values = all[kind];
  useEffect(() => {
    const others = Object.fromEntries(ALL_NAMES.map((name) => [name, null]));
    write({ ...others, ...values, calc: kind });
  }, [kind, values, write]);
  const choose = (text: string) => setKind(oneOf(KINDS, text) ?? 'standard');
  const inputs = {
    fields: calculator.fields,
    values,
    lots,
    onChange: (name: string, value: string) => setAll({ ...all, [kind]: { ...values, [name]: value } }),
  };
  const content = (
    <div className="calculator">
      <p className="calculator-sentence">{calculator.sentence}</p>
      {kind === 'plan' ? (
        <PlanResults key={kind} calculator={calculator} values={values}>
          {(issueFor) => <CalculatorInputs {...inputs} issueFor={issueFor} />}
        </PlanResults>
      ) : (
        <FigureResults key={kind} calculator={calculator} values={values}>
          {(issueFor) => <CalculatorInputs {...inputs} issueFor={issueFor} />}
        </FigureResults>
      )}
    </div>
  );
  const items = CALCULATORS.map((one) => ({ value: one.kind, label: one.label, content }));
  return (
    <div ref={ref}>
      <PageHead
        name="Calculator"
        sentence="Each figure comes with its U, the equation behind it, where that holds, and who published it."
      />
      {width < TABS_PX ? (
        <>
          <Field label="Calculate">
            <Select options={items} value={kind} onChange={(event) => choose(event.target.value)} />
          </Field>
          {content}
        </>
      ) : (
        <Tabs label="What to calculate" items={items} value={kind} onChange={choose} />
      )}
    </div>
  );
}

/** The address speaks of the calculator it names; the others begin as they are delivered. */
function startingValues(
  kind: CalculatorKind,
  read: (name: string) => string,
): Record<CalculatorKind, Values> {
  return Object.fromEntries(
    CALCULATORS.map((one) => [one.kind, initialValues(one.fields, one.kind === kind ? read : () => '')]),
  ) as Record<CalculatorKind, Values>;
}

import { useQuery } from '@tanstack/react-query';
import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { BenchCalculator } from '../features/calculations/components/calculator.tsx';
import { standardsList } from '../features/standards/api.ts';
import { inUseFirst, solutionName } from '../features/standards/model.ts';
import { standardTabs } from './area-pages.ts';

/** Bench calculations, with the registered lots to choose from. */
export default function CalculatorPage() {
  const lots = inUseFirst(useQuery(standardsList()).data?.items ?? []).map((lot) => ({
    value: String(lot.id),
    label: `${lot.code} · ${solutionName(lot)}${lot.isUsable ? '' : ' (not to be used)'}`,
  }));
  return (
    <>
      <AreaTabs label="Reference solutions" items={standardTabs} />
      <BenchCalculator lots={lots} />
    </>
  );
}

import { useQuery } from '@tanstack/react-query';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace } from '../components/ui/faces.tsx';
import { instrumentsList } from '../features/instruments/api.ts';
import { standardsList } from '../features/standards/api.ts';
import { DiluteForm } from '../features/standards/components/dilute-form.tsx';
import { idOf, useAddressFilters } from '../lib/use-address-filters.ts';
import { paths } from '../paths.ts';

/** Lots that may be diluted are those whose answer says so; without one there is nothing to begin with. */
export default function DiluteStandardPage() {
  const standardId = idOf(useAddressFilters().read('standardId')) ?? null;
  const lots = useQuery(standardsList());
  const instruments = useQuery(instrumentsList()).data?.items ?? [];
  const balances = instruments.filter((one) => one.kind === 'balance' && one.isUsable);
  return (
    <Answer query={lots} what="the lots">
      {({ items }) => {
        const mayDilute = items.filter((lot) => lot.can.dilute);
        if (mayDilute.length > 0)
          return <DiluteForm lots={mayDilute} standardId={standardId} balances={balances} />;
        return (
          <EmptyFace
            title="There is no lot that you may dilute."
            actions={<ButtonLink to={paths.standards.to()}>To the lots</ButtonLink>}
          >
            It takes a released, unexpired lot of potassium chloride in water, and a technician or a manager.
          </EmptyFace>
        );
      }}
    </Answer>
  );
}

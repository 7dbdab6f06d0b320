import { useQuery } from '@tanstack/react-query';
import { Answer } from '../components/ui/answer.tsx';
import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace } from '../components/ui/faces.tsx';
import { instrumentsList } from '../features/instruments/api.ts';
import { useSession } from '../features/sessions/session-context.ts';
import { PrepareForm } from '../features/standards/components/prepare-form.tsx';
import { paths } from '../paths.ts';

export default function PrepareStandardPage() {
  const { can } = useSession();
  const query = useQuery(instrumentsList());
  if (!can.prepareStandard) {
    return (
      <EmptyFace
        title="You make no reference solutions."
        actions={<ButtonLink to={paths.standards.to()}>To the lots</ButtonLink>}
      >
        A technician or an instrument manager does that.
      </EmptyFace>
    );
  }
  return (
    <Answer query={query} what="the balances">
      {({ items }) => (
        <PrepareForm balances={items.filter((one) => one.kind === 'balance' && one.isUsable)} />
      )}
    </Answer>
  );
}

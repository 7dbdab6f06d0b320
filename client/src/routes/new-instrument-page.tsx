import { ButtonLink } from '../components/ui/button.tsx';
import { EmptyFace } from '../components/ui/faces.tsx';
import { NewInstrumentForm } from '../features/instruments/components/new-instrument-form.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { paths } from '../paths.ts';

export default function NewInstrumentPage() {
  if (useSession().can.createInstrument) return <NewInstrumentForm />;
  return (
    <EmptyFace
      title="You register no reference instruments."
      actions={<ButtonLink to={paths.instruments.to()}>To the instruments</ButtonLink>}
    >
      An instrument manager does that.
    </EmptyFace>
  );
}

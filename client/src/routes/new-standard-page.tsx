import { NewLotForm } from '../features/standards/components/new-lot-form.tsx';

export default function NewStandardPage() {
  return <NewLotForm />;
}

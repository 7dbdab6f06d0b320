import { Account } from '../features/sessions/components/account.tsx';
import { useSession } from '../features/sessions/session-context.ts';

export default function AccountPage() {
  return <Account session={useSession()} />;
}

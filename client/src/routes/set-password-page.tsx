import { useSearchParams } from 'react-router-dom';
import { SetPasswordForm } from '../features/sessions/components/set-password-form.tsx';
import { Threshold } from '../features/sessions/components/threshold.tsx';

/** Where the link of an invitation leads. */
export default function SetPasswordPage() {
  const [params] = useSearchParams();
  return (
    <Threshold title="Set your password">
      <SetPasswordForm token={params.get('token')} />
    </Threshold>
  );
}

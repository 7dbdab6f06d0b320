import { Link } from 'react-router-dom';
import { PageHead } from '../components/ui/page-head.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { settingsPages } from './area-pages.ts';

/** What can be set, one line each. */
export default function SettingsPage() {
  const session = useSession();
  return (
    <>
      <PageHead
        name="Settings"
        sentence="Who and what there is, and the few values that hold everywhere. Every change is kept with your name."
      />
      <ul className="site-lines">
        {settingsPages(session).map((page) => (
          <li key={page.to}>
            <Link to={page.to}>{page.label}</Link>
            <p>{page.sentence}</p>
          </li>
        ))}
      </ul>
    </>
  );
}

import { Link, useLocation } from 'react-router-dom';

export interface AreaTab {
  label: string;
  to: string;
}

/** The pages of one area, as tabs that are links: the present one stands between two posts. */
export function AreaTabs({ label, items }: { label: string; items: readonly AreaTab[] }) {
  const { pathname } = useLocation();
  const current = items
    .filter((item) => pathname === item.to || pathname.startsWith(`${item.to}/`))
    .sort((a, b) => b.to.length - a.to.length)[0];
  if (items.length < 2) return null;
  return (
    <nav className="tabs-list area-tabs" aria-label={label}>
      {items.map((item) => (
        <Link
          key={item.to}
          to={item.to}
          className="tab"
          data-state={item === current ? 'active' : undefined}
          aria-current={item === current ? 'page' : undefined}
        >
          {item.label}
        </Link>
      ))}
    </nav>
  );
}

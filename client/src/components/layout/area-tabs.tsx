import { Link, useLocation } from 'react-router-dom';

export interface AreaTab {
  label: string;
  to: string;
}

export interface AreaTabsProps {
  label: string;
  items: readonly AreaTab[];
  /** The page that lists them all: on a phone, where they would need two lines, a link to it stands instead. */
  home?: AreaTab;
}

/** The pages of one area, as tabs that are links: the present one stands between two posts. */
export function AreaTabs({ label, items, home }: AreaTabsProps) {
  const { pathname } = useLocation();
  const current = items
    .filter((item) => pathname === item.to || pathname.startsWith(`${item.to}/`))
    .sort((a, b) => b.to.length - a.to.length)[0];
  if (items.length < 2) return null;
  return (
    <>
      {home ? (
        <p className="crumbs area-tabs-home">
          <Link to={home.to}>{home.label}</Link>
        </p>
      ) : null}
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
    </>
  );
}

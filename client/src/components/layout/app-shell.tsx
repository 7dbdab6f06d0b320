import type { ReactNode } from 'react';
import { useEffect, useRef, useState } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { classNames } from '../ui/button.tsx';
import { Mark } from '../ui/marks.tsx';
import { Dialog } from '../ui/dialog.tsx';
import { Button } from '../ui/button.tsx';
import type { MenuItem } from '../ui/menu.tsx';
import { Menu } from '../ui/menu.tsx';
import { ConnectionBanner } from './connection-banner.tsx';

export interface RailArea {
  label: string;
  to: string;
  /** Where the addresses of this area begin, when they do not all begin with `to`. */
  under?: readonly string[];
  /** A small figure beside the name: open alerts. */
  count?: number;
}

export interface AppShellProps {
  /** Where the mark leads. */
  home: string;
  /** The site switcher: <Switcher/>. */
  site?: ReactNode;
  areas: readonly RailArea[];
  /** The search field: <SearchBox/>. */
  search?: ReactNode;
  person: { name: string; role: string; items: readonly MenuItem[] };
  /** In the person's menu under a line: <ThemeToggle/>. */
  personFoot?: ReactNode;
  /** Show the banner when live updates stop arriving. Default true. */
  isLive?: boolean;
  children: ReactNode;
}

/** Rail, banner and the page under it. Knows no area and no person: all of it comes as props. */
export function AppShell(props: AppShellProps) {
  const { home, site, areas, search, person, personFoot, isLive = true, children } = props;
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  useFocusOnNewPage(main, pathname);
  return (
    <div className="shell">
      <a className="skip-link" href="#main">
        To the page
      </a>
      <header className="rail">
        <Link className="brand" to={home} aria-label="Saltmark, to the start">
          <Mark height={24} />
          <span>Saltmark</span>
        </Link>
        {site}
        <nav className="rail-areas" aria-label="Areas">
          <AreaLinks areas={areas} pathname={pathname} />
        </nav>
        {search}
        <Menu
          label="You"
          align="end"
          items={person.items}
          foot={personFoot ? <div className="p-4">{personFoot}</div> : undefined}
          trigger={
            <button type="button" className="rail-person">
              {person.name}
              <small>{person.role}</small>
            </button>
          }
        />
        <AreasSheet {...props} pathname={pathname} />
      </header>
      {isLive ? <ConnectionBanner /> : null}
      <main id="main" ref={main} tabIndex={-1} className="page">
        {children}
      </main>
    </div>
  );
}

function AreaLinks({ areas, pathname }: { areas: readonly RailArea[]; pathname: string }) {
  const current = currentArea(areas, pathname);
  return areas.map((area) => (
    <Link
      key={area.to}
      to={area.to}
      className="rail-area"
      aria-current={area === current ? 'page' : undefined}
    >
      {area.label}
      {area.count ? (
        <sup>
          {area.count}
          <span className="sr-only"> open</span>
        </sup>
      ) : null}
    </Link>
  ));
}

/** The area whose address begins the present one; the longest wins. */
export function currentArea(areas: readonly RailArea[], pathname: string): RailArea | undefined {
  const isUnder = (start: string) =>
    pathname === start || pathname.startsWith(start.replace(/\/$/, '') + '/');
  return areas
    .filter((area) => (area.under ?? [area.to]).some(isUnder))
    .sort((a, b) => b.to.length - a.to.length)[0];
}

/** Behind the "Areas" button where the rail is too narrow for the areas. */
function AreasSheet({ areas, search, person, personFoot, pathname }: AppShellProps & { pathname: string }) {
  const [openedAt, setOpenedAt] = useState<string | null>(null);
  // Going somewhere closes the sheet.
  const isOpen = openedAt === pathname;
  const close = () => setOpenedAt(null);
  return (
    <>
      <button
        type="button"
        className="rail-menu-button"
        aria-haspopup="dialog"
        onClick={() => setOpenedAt(pathname)}
      >
        Areas
      </button>
      <Dialog
        isOpen={isOpen}
        onClose={close}
        title="Areas"
        className="areas-sheet"
        actions={<Button onClick={close}>Close</Button>}
      >
        {search}
        <nav aria-label="Areas" className="-mx-4 border-t border-rule">
          <AreaLinks areas={areas} pathname={pathname} />
        </nav>
        <div>
          <p className="font-mono text-t-1 font-medium">
            {person.name} <span className="font-normal text-ink-3">{person.role}</span>
          </p>
          <ul className="mt-2">
            {person.items.map((item) => (
              <li key={item.label}>
                {item.to === undefined ? (
                  <button type="button" className="link min-h-12 font-mono" onClick={item.onSelect}>
                    {item.label}
                  </button>
                ) : (
                  <Link
                    className={classNames('link', 'inline-flex min-h-12 items-center font-mono')}
                    to={item.to}
                  >
                    {item.label}
                  </Link>
                )}
              </li>
            ))}
          </ul>
        </div>
        {personFoot}
      </Dialog>
    </>
  );
}

/** A new page is announced by moving the focus to it; the first one keeps the browser's own start. */
function useFocusOnNewPage(main: React.RefObject<HTMLElement | null>, pathname: string): void {
  const last = useRef(pathname);
  useEffect(() => {
    if (last.current === pathname) return;
    last.current = pathname;
    // The page's own heading may have taken the focus already.
    if (!main.current?.contains(document.activeElement)) main.current?.focus({ preventScroll: true });
    window.scrollTo(0, 0);
  }, [main, pathname]);
}

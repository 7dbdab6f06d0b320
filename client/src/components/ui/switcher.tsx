import { Chevron } from './chevron.tsx';
import type { MenuItem } from './menu.tsx';
import { Menu } from './menu.tsx';

export interface SwitcherProps {
  /** What is chosen now, as printed in the rail. */
  current: string;
  label: string;
  items: readonly MenuItem[];
}

/** The rail's "where am I": the name of the place and the others to go to. */
export function Switcher({ current, label, items }: SwitcherProps) {
  if (items.length < 2) return <span className="rail-site">{current}</span>;
  return (
    <Menu
      label={label}
      items={items}
      trigger={
        <button type="button" className="rail-site" aria-label={`${label}: ${current}`}>
          {current}
          <Chevron />
        </button>
      }
    />
  );
}

import { DropdownMenu as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { classNames } from './button.tsx';

export interface MenuItem {
  label: string;
  /** A second line in plain words. */
  hint?: string;
  /** Somewhere to go; otherwise `onSelect`. */
  to?: string;
  onSelect?: () => void;
  isDanger?: boolean;
  isDisabled?: boolean;
  isCurrent?: boolean;
}

export interface MenuProps {
  /** The element that opens the menu: one button. */
  trigger: ReactNode;
  label: string;
  items: readonly MenuItem[];
  /** Shown above the entries. */
  head?: ReactNode;
  /** Shown under a line below the entries; not part of the arrow-key round. */
  foot?: ReactNode;
  align?: 'start' | 'end';
}

/**
 * A menu of actions or places. Not modal: the modal kind injects a style element, which the content policy refuses,
 * and a menu needs no lock.
 */
export function Menu({ trigger, label, items, head, foot, align = 'start' }: MenuProps) {
  return (
    <Primitive.Root modal={false}>
      <Primitive.Trigger asChild>{trigger}</Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          className="menu"
          align={align}
          sideOffset={8}
          collisionPadding={8}
          aria-label={label}
        >
          {head ? <Primitive.Label className="menu-head">{head}</Primitive.Label> : null}
          {items.map((item) => (
            <MenuEntry key={item.label} item={item} />
          ))}
          {foot ? <div className="menu-line">{foot}</div> : null}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

function MenuEntry({ item }: { item: MenuItem }) {
  const className = classNames('menu-item', item.isDanger && 'is-danger', item.isCurrent && 'is-current');
  const content = (
    <>
      <span>{item.label}</span>
      {item.hint ? <small>{item.hint}</small> : null}
    </>
  );
  if (item.to !== undefined && !item.isDisabled) {
    return (
      <Primitive.Item asChild className={className} onSelect={item.onSelect}>
        <Link to={item.to} aria-current={item.isCurrent ? 'page' : undefined}>
          {content}
        </Link>
      </Primitive.Item>
    );
  }
  return (
    <Primitive.Item className={className} disabled={item.isDisabled} onSelect={item.onSelect}>
      {content}
    </Primitive.Item>
  );
}

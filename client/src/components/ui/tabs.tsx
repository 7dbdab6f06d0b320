import { Tabs as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';

export interface TabItem {
  value: string;
  label: string;
  content: ReactNode;
}

export interface TabsProps {
  label: string;
  items: readonly TabItem[];
  /** Controlled, for tabs that are part of the address. */
  value?: string;
  onChange?: (value: string) => void;
}

/** Tabs: the active one stands between two posts. Arrow keys move. */
export function Tabs({ label, items, value, onChange }: TabsProps) {
  const first = items[0]?.value ?? '';
  return (
    <Primitive.Root
      defaultValue={first}
      {...(value === undefined ? {} : { value })}
      {...(onChange ? { onValueChange: onChange } : {})}
    >
      <Primitive.List className="tabs-list" aria-label={label}>
        {items.map((item) => (
          <Primitive.Trigger key={item.value} value={item.value} className="tab">
            {item.label}
          </Primitive.Trigger>
        ))}
      </Primitive.List>
      {items.map((item) => (
        <Primitive.Content key={item.value} value={item.value} className="tab-panel">
          {item.content}
        </Primitive.Content>
      ))}
    </Primitive.Root>
  );
}

import type { ReactNode } from 'react';

export interface Definition {
  term: string;
  value: ReactNode;
}

/** Names and values of one thing, a hairline between them. */
export function DefinitionList({ items }: { items: readonly Definition[] }) {
  return (
    <dl className="definitions">
      {items.map((item) => (
        <div key={item.term}>
          <dt>{item.term}</dt>
          <dd>{item.value ?? '–'}</dd>
        </div>
      ))}
    </dl>
  );
}

import type { ReactNode } from 'react';

/** Facts in a line: small term above, value in mono below, hairlines between. Items without a value are left out. */
export function Facts({ items }: { items: readonly { term: string; value: ReactNode }[] }) {
  return (
    <dl className="facts">
      {items
        .filter((item) => item.value !== null && item.value !== undefined && item.value !== '')
        .map((item) => (
          <div key={item.term}>
            <dt>{item.term}</dt>
            <dd>{item.value}</dd>
          </div>
        ))}
    </dl>
  );
}

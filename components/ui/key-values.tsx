import type { ReactNode } from 'react';

/** Terms and values in two columns, for the margin and for records. */
export function KeyValues({ items }: { items: readonly { term: string; value: ReactNode }[] }) {
  return (
    <dl className="kv">
      {items.map((item) => (
        <KeyValue key={item.term} {...item} />
      ))}
    </dl>
  );
}

function KeyValue({ term, value }: { term: string; value: ReactNode }) {
  return (
    <>
      <dt>{term}</dt>
      <dd>{value}</dd>
    </>
  );
}

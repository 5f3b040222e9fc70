import { numbers } from '@/components/ui/numbers';

/** Facts in a line whose terms hold symbols (ρ, λ), which stand in the mono face; empty ones are left out. */
export function FactsLine({ items }: { items: readonly { term: string; value: string }[] }) {
  return (
    <dl className="facts">
      {items
        .filter((item) => item.value !== '')
        .map((item) => (
          <div key={item.term}>
            <dt>{numbers(item.term)}</dt>
            <dd>{item.value}</dd>
          </div>
        ))}
    </dl>
  );
}

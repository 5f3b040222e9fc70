import { Sheet } from '@/components/shell/sheet';
import { Section } from '@/components/ui/section';

/** The final layout with rules and heads while a page is read; after 400 ms it says so in words. */
export function LoadingSheet({ titles }: { titles: readonly string[] }) {
  return (
    <Sheet trail={[]}>
      <Section>
        <p className="name">
          <span className="reading">reading</span>
        </p>
      </Section>
      {titles.map((title) => (
        <Section key={title} title={title}>
          <p className="say loading-space" />
        </Section>
      ))}
    </Sheet>
  );
}

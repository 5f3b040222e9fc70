import { Section } from '@/components/ui/section';

/** The readout's layout before it has been read: rules and heads, no grey blocks. */
export default function LoadingReadout() {
  return (
    <main id="sheet">
      <Section>
        <p className="reading say">reading the readout</p>
      </Section>
      {['Fold strip', 'Held-out against true', 'How sure', 'Leak report', 'Record'].map((title) => (
        <Section key={title} title={title}>
          <p className="reading say">reading</p>
        </Section>
      ))}
    </main>
  );
}

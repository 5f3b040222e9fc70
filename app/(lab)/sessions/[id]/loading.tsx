import { Section } from '@/components/ui/section';

/** The session sheet's layout before it has been read: rules and heads, no grey blocks. */
export default function LoadingSession() {
  return (
    <main id="sheet">
      <Section>
        <p className="reading say">reading the session</p>
      </Section>
      {['Fold strip', 'Label', 'Units', 'Left out', 'Attempt ledger'].map((title) => (
        <Section key={title} title={title}>
          <p className="reading say">reading</p>
        </Section>
      ))}
    </main>
  );
}

import Link from 'next/link';
import { numbers } from '@/components/ui/numbers';
import { SeverityMark } from '@/components/ui/severity-mark';
import type { Severity } from '@/lib/contracts/problem';

/** Something that wants a person: how grave, about what, in a sentence, and the link that leads there. */
export interface AttentionItem {
  severity: Severity;
  subject: string;
  sentence: string;
  act: { href: string; words: string };
}

/** What of a study wants somebody, the gravest first. */
export function AttentionList({ items }: { items: readonly AttentionItem[] }) {
  return (
    <ol className="att">
      {items.map((item) => (
        <li key={`${item.subject} ${item.sentence}`}>
          <SeverityMark severity={item.severity} />
          <span>
            <b>{numbers(item.subject)}</b>
          </span>
          <span className="say">{numbers(item.sentence)}</span>
          <Link href={item.act.href}>{item.act.words}</Link>
        </li>
      ))}
    </ol>
  );
}

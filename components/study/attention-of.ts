import type { AttentionItem } from '@/components/study/attention-list';
import type { ForestRow } from '@/components/study/forest-row';
import type { Problem } from '@/lib/contracts/problem';

const order = { stops: 0, warns: 1, notes: 2 } as const;

/** Which sessions of a study want somebody, and for what: refused, waiting for a decision, empty, or ready and not read out. */
export function attentionOf(
  rows: readonly (ForestRow & { problems: readonly Problem[] })[],
): AttentionItem[] {
  return rows
    .flatMap((row): AttentionItem[] => {
      const intake = { href: `/sessions/${row.sessionId}/intake`, words: 'Open the intake' };
      const first = [...row.problems].sort((a, b) => order[a.severity] - order[b.severity])[0]?.message;
      if (row.state === 'refused')
        return [
          {
            severity: 'stops',
            subject: row.name,
            sentence: first ? `Refused at intake: ${first}` : 'Refused at intake.',
            act: { ...intake, words: 'See the place' },
          },
        ];
      if (row.state === 'waiting')
        return [
          {
            severity: 'warns',
            subject: row.name,
            sentence: first ? `Waits for a decision: ${first}` : 'Waits for a decision on its warnings.',
            act: intake,
          },
        ];
      if (row.state === 'empty')
        return [
          {
            severity: 'notes',
            subject: row.name,
            sentence: 'Has a date and an animal, no data yet.',
            act: { ...intake, words: 'Bring the files in' },
          },
        ];
      if (row.state === 'ready' && row.nReadouts === 0)
        return [
          {
            severity: 'notes',
            subject: row.name,
            sentence: 'Ready, and no readout has been tried.',
            act: { href: `/sessions/${row.sessionId}`, words: 'Open the session' },
          },
        ];
      return [];
    })
    .sort((a, b) => order[a.severity] - order[b.severity]);
}

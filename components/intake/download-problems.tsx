'use client';

import { Button } from '@/components/ui/button';
import type { Problem } from '@/lib/contracts/problem';
import { formatPlace } from '@/lib/format/format-place';

/** A cell of a CSV; what a spreadsheet would take for a formula is made text. */
function cell(text: string): string {
  const safe = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return `"${safe.replaceAll('"', '""')}"`;
}

/** Saves the list of problems as CSV, to be sent to whoever made the files. */
export function DownloadProblems({ problems, name }: { problems: readonly Problem[]; name: string }) {
  const save = () => {
    const rows = problems.map((problem) =>
      [problem.severity, problem.code, problem.message, formatPlace(problem.place), problem.remedy ?? '']
        .map(cell)
        .join(','),
    );
    const blob = new Blob([['severity,code,message,place,remedy', ...rows, ''].join('\r\n')], {
      type: 'text/csv',
    });
    const link = document.createElement('a');
    link.href = URL.createObjectURL(blob);
    link.download = `${name} problems.csv`;
    link.click();
    setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
  };
  return (
    <Button kind="link" onClick={save}>
      Download the list
    </Button>
  );
}

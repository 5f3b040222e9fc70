import { Fragment } from 'react';
import { numbers } from '@/components/ui/numbers';
import type { Verdict } from '@/lib/contracts/readout';

/** The verdict in one sentence, the words that are the answer in bold. */
export function VerdictLine({ verdict }: { verdict: Verdict }) {
  const pieces: { text: string; isStrong: boolean }[] = [{ text: verdict.sentence, isStrong: false }];
  for (const strong of verdict.strong) {
    const index = pieces.findIndex((piece) => !piece.isStrong && piece.text.includes(strong));
    if (index < 0) continue;
    const { text } = pieces[index];
    const at = text.indexOf(strong);
    pieces.splice(
      index,
      1,
      { text: text.slice(0, at), isStrong: false },
      { text: strong, isStrong: true },
      { text: text.slice(at + strong.length), isStrong: false },
    );
  }
  return (
    <p className="verdict">
      {pieces.map((piece, index) =>
        piece.isStrong ? (
          <b key={index}>{numbers(piece.text)}</b>
        ) : (
          <Fragment key={index}>{numbers(piece.text)}</Fragment>
        ),
      )}
    </p>
  );
}

import { Fragment } from 'react';
import { numbers } from '@/components/ui/numbers';
import type { Verdict } from '@/lib/contracts/readout';

/**
 * The verdict in one sentence, the words that are the answer in bold. A readout that follows no plan says so first, with its
 * place among all that were tried.
 */
export function VerdictLine({ verdict, place }: { verdict: Verdict; place: { number: number; of: number } }) {
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
      {numbers(`Exploratory, number ${place.number} of ${place.of}: `)}
      {pieces.map((piece, index) => {
        const text = index === 0 ? afterColon(piece.text) : piece.text;
        return piece.isStrong ? (
          <b key={index}>{inWords(text)}</b>
        ) : (
          <Fragment key={index}>{inWords(text)}</Fragment>
        );
      })}
    </p>
  );
}

/** A sentence goes on after a colon in small letters, unless it begins with a name. */
function afterColon(text: string): string {
  return text.replace(/^(These|This|At)\b/, (word) => word.toLowerCase());
}

/** Numbers in their own face, and "held-out" never parted at its hyphen. */
function inWords(text: string) {
  return text.split(/(held-out)/).map((part, index) =>
    part === 'held-out' ? (
      <span key={index} style={{ whiteSpace: 'nowrap' }}>
        {part}
      </span>
    ) : (
      <Fragment key={index}>{numbers(part)}</Fragment>
    ),
  );
}

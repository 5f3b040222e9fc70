import type { DraftOutcome } from '@/lib/client/intake/intake-from-draft';
import { countSeverities } from '@/components/intake/count-severities';
import type { StoredFile } from '@/lib/contracts/file';
import type { Problem } from '@/lib/contracts/problem';
import type { Session } from '@/lib/contracts/session';

/** What the foot of the page says, and why the data cannot be confirmed yet (null where they can). */
export interface IntakeState {
  words: string;
  why: string | null;
}

/** Puts together what is still to be settled before the data can be confirmed, the nearest thing first. */
export function intakeState(facts: {
  session: Session;
  files: readonly StoredFile[];
  nSending: number;
  outcome: DraftOutcome;
  problems: readonly Problem[];
  isProposing: boolean;
  isPreviewOld: boolean;
  acceptsWarnings: boolean;
  maySubmit: boolean;
}): IntakeState {
  const { session, files, outcome, problems } = facts;
  const blocked = (words: string): IntakeState => ({ words, why: words });
  if (!facts.maySubmit) return blocked('Your role can look at an intake and not confirm it.');
  if (session.state === 'checking')
    return blocked(
      'The files are being read and checked as the mapping says. You can leave the page; it goes on.',
    );
  if (facts.nSending > 0)
    return blocked(
      facts.nSending === 1
        ? 'One file is still on its way.'
        : `${facts.nSending} files are still on their way.`,
    );
  if (files.some((file) => file.state === 'reading')) return blocked('A file is still being read.');
  if (!files.some((file) => file.state === 'readable'))
    return blocked('Add the files of this recording: its spike counts and its trial table.');
  if (facts.isProposing) return blocked('A mapping is being proposed.');
  if (outcome.intake === null)
    return blocked(
      outcome.missing.length === 1
        ? outcome.missing[0]
        : `${outcome.missing.length} things of the mapping must be settled. ${outcome.missing[0]}`,
    );
  const { stops, warns } = countSeverities(problems);
  if (stops > 0)
    return blocked(stops === 1 ? 'One thing must be settled.' : `${stops} things must be settled.`);
  if (facts.isPreviewOld) return blocked('The mapping is being tried out on the files.');
  if (warns > 0 && !facts.acceptsWarnings)
    return blocked(
      warns === 1 ? 'Settle the warning, or accept it.' : `Settle the ${warns} warnings, or accept them.`,
    );
  return {
    words: 'Confirming writes the data once more in their canonical form, with a hash over the content.',
    why: null,
  };
}

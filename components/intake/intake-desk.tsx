'use client';

import Link from 'next/link';
import { useState } from 'react';
import { ArraysTable } from '@/components/intake/arrays-table';
import { DownloadProblems } from '@/components/intake/download-problems';
import { FileDrop } from '@/components/intake/file-drop';
import { FilesOnTheirWay } from '@/components/intake/files-on-their-way';
import { FirstTrials } from '@/components/intake/first-trials';
import { IntakeBar } from '@/components/intake/intake-bar';
import { intakeState } from '@/components/intake/intake-state';
import { LengthsTable } from '@/components/intake/lengths-table';
import { MappingSentence } from '@/components/intake/mapping-sentence';
import { problemsOf } from '@/components/intake/problems-of';
import { countSeverities } from '@/components/intake/count-severities';
import { useMapping } from '@/components/intake/use-mapping';
import { useSessionFiles } from '@/components/intake/use-session-files';
import { useSubmitIntake } from '@/components/intake/use-submit-intake';
import { Button } from '@/components/ui/button';
import { FormError } from '@/components/ui/form-error';
import { MarginNote } from '@/components/ui/margin-note';
import { ProblemList } from '@/components/ui/problem-list';
import { Section } from '@/components/ui/section';
import { numbers } from '@/components/ui/numbers';
import { matchLengths } from '@/lib/client/intake/match-lengths';
import { usedArrays } from '@/lib/client/intake/used-arrays';
import { randomKey } from '@/lib/client/random-key';
import { useUploads } from '@/lib/client/upload/use-uploads';
import type { StoredFile } from '@/lib/contracts/file';
import type { Session } from '@/lib/contracts/session';
import { formatPlural } from '@/lib/format/format-plural';

/** Bringing a session's files in: sending, mapping, checking, confirming; all of it on one sheet. */
export function IntakeDesk({
  session: initialSession,
  files: initialFiles,
  mayUpload,
  maySubmit,
}: {
  session: Session;
  files: StoredFile[];
  mayUpload: boolean;
  maySubmit: boolean;
}) {
  const { session, files, refresh } = useSessionFiles({ session: initialSession, files: initialFiles });
  const { uploads, add, drop } = useUploads(session.id, files, refresh);
  const readable = useReadable(files);
  const mapping = useMapping(session, readable);
  const submit = useSubmitIntake(session.id, refresh);
  const [accepted, setAccepted] = useState<string | null>(null);

  const { draft, outcome, preview } = mapping;
  const used = usedArrays(draft, readable);
  const matched = matchLengths(draft, readable);
  const problems = problemsOf({ files, preview: preview?.problems, session });
  const warnings = problems.filter((problem) => problem.severity === 'warns');
  // what is accepted are these very warnings, not those of another mapping
  const warningsKey = warnings.map((problem) => `${problem.code} ${problem.message}`).join('\n');
  const acceptsWarnings = warnings.length > 0 && accepted === warningsKey;
  const nSending = uploads.filter((upload) => !['sent', 'refused'].includes(upload.snapshot.phase)).length;
  const state = intakeState({
    session,
    files,
    nSending,
    outcome,
    problems,
    isProposing: mapping.isProposing,
    isPreviewOld: mapping.isPreviewOld,
    acceptsWarnings,
    maySubmit,
  });
  const { stops, warns, notes } = countSeverities(problems);
  const version = (session.dataVersion ?? 0) + 1;
  // nothing is left to confirm while the mapping is the one that was just confirmed
  const isAsConfirmed =
    session.state === 'ready' &&
    submit.isSuccess &&
    JSON.stringify(submit.variables.intake) === JSON.stringify(outcome.intake);

  return (
    <FileDrop onFiles={add} isOff={!mayUpload}>
      {({ zone }) => (
        <>
          <Section
            side={
              <>
                <p className="study-facts-side">
                  <b>{numbers(session.name)}</b>
                </p>
                <p>
                  {session.dataVersion === null
                    ? 'Recording session, no data yet. Nothing is stored as the session’s data until you confirm.'
                    : numbers(
                        `Data version ${session.dataVersion} is in place. What you confirm here becomes version ${version}; the earlier one is kept.`,
                      )}
                </p>
              </>
            }
          >
            <h1 className="name">Bring the files in</h1>
            <FilesOnTheirWay
              files={files}
              uploads={uploads}
              onDrop={drop}
              onChanged={refresh}
              mayRemove={mayUpload}
            />
            {zone}
          </Section>
          {readable.length > 0 ? (
            <>
              <Section
                title="Arrays found"
                id="arrays"
                why="What the files hold, and what each is taken for. Change any word."
                side={
                  mapping.isChanged ? (
                    <p>
                      <Button kind="link" onClick={mapping.forgetChanges}>
                        Back to the proposal
                      </Button>
                    </p>
                  ) : null
                }
              >
                <ArraysTable files={readable} draft={draft} onUse={mapping.use} />
                <FormError message={mapping.proposalError?.message} />
              </Section>
              <Section
                title="Lengths matched"
                id="lengths"
                why="Arrays that share an axis must have one length along it."
                side={(mapping.isProposing ? [] : outcome.missing).map((sentence) => (
                  <MarginNote key={sentence} kind="stop" who="to settle">
                    {sentence}
                  </MarginNote>
                ))}
              >
                <MappingSentence draft={draft} used={used} onChange={mapping.change} />
                <LengthsTable matched={matched} />
                {outcome.intake === null && mapping.questions.length > 0 ? (
                  <ul className="questions">
                    {mapping.questions.map((question) => (
                      <li key={question.field} className="say">
                        {numbers(question.question)}
                        {question.options.length > 0 ? ` ${question.options.slice(0, 8).join(', ')}.` : ''}
                      </li>
                    ))}
                  </ul>
                ) : null}
              </Section>
            </>
          ) : null}
          {problems.length > 0 ? (
            <Section
              title="Problems"
              id="problems"
              why={`${stops} stop, ${warns} warn, ${notes} note. Each says where and what to do.`}
              side={
                <p>
                  <DownloadProblems problems={problems} name={session.name} />
                </p>
              }
            >
              <ProblemList problems={problems} />
            </Section>
          ) : null}
          {preview && preview.nTrials > 0 && draft.binWidthMs !== null && draft.windowStartMs !== null ? (
            <Section title="First trials" id="first-trials" why="Does this look like your recording?">
              <FirstTrials
                preview={preview}
                labels={used.filter(({ use }) => use.kind === 'label').map(({ name }) => name)}
                binWidthMs={draft.binWidthMs}
                windowStartMs={draft.windowStartMs}
              />
            </Section>
          ) : null}
          <IntakeBar
            problems={problems}
            acts={
              <>
                {session.state === 'ready' ? (
                  <Link className="btn" href={`/sessions/${session.id}`}>
                    To the session
                  </Link>
                ) : null}
                {isAsConfirmed ? null : (
                  <Button
                    kind={session.state === 'ready' ? 'plain' : 'filled'}
                    why={state.why ?? (submit.isPending ? 'Being sent.' : null)}
                    showWhy={false}
                    onClick={() => {
                      if (outcome.intake)
                        submit.mutate({
                          intake: outcome.intake,
                          acceptWarnings: acceptsWarnings,
                          key: randomKey(),
                        });
                    }}
                  >
                    Confirm data version <span className="n">{version}</span>
                  </Button>
                )}
              </>
            }
          >
            <p>
              {numbers(
                submit.isPending
                  ? 'The mapping is being sent.'
                  : session.state === 'ready'
                    ? readyWords(session)
                    : state.words,
              )}
            </p>
            {warnings.length > 0 && stops === 0 && outcome.intake !== null && !isAsConfirmed ? (
              <label>
                <input
                  type="checkbox"
                  checked={acceptsWarnings}
                  onChange={(event) => setAccepted(event.target.checked ? warningsKey : null)}
                />
                {numbers(
                  `I have read the ${formatPlural(warnings.length, 'warning')} and accept ${warnings.length === 1 ? 'it' : 'them'}; the record says so.`,
                )}
              </label>
            ) : null}
            <FormError message={submit.error?.message ?? mapping.previewError?.message} />
          </IntakeBar>
        </>
      )}
    </FileDrop>
  );
}

/** The readable files, the same list as long as they are the same files. */
function useReadable(files: readonly StoredFile[]): readonly StoredFile[] {
  const key = files
    .filter((file) => file.state === 'readable')
    .map((file) => file.id)
    .join(' ');
  const [kept, setKept] = useState({ key: '', list: [] as readonly StoredFile[] });
  if (kept.key !== key) setKept({ key, list: files.filter((file) => file.state === 'readable') });
  return kept.list;
}

function readyWords(session: Session): string {
  const size = [
    formatPlural(session.trials ?? 0, 'trial'),
    formatPlural(session.units ?? 0, 'unit'),
    formatPlural(session.bins ?? 0, 'bin'),
  ].join(', ');
  return `Data version ${session.dataVersion ?? 1} is ready: ${size}. Other files or another mapping would become a new version.`;
}

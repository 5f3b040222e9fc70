'use client';

import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import type { ArrayUse } from '@/lib/client/intake/array-use';
import { draftFromIntake } from '@/lib/client/intake/draft-from-intake';
import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import { intakeFromDraft } from '@/lib/client/intake/intake-from-draft';
import { mergeDraft } from '@/lib/client/intake/merge-draft';
import { requestJson } from '@/lib/client/request-json';
import type { StoredFile } from '@/lib/contracts/file';
import { intakeProposalSchema, type IntakeProposal } from '@/lib/contracts/intake';
import { intakePreviewSchema } from '@/lib/contracts/intake-answer';
import type { Session } from '@/lib/contracts/session';

const nFirstTrials = 6;
const settleMs = 500;

/** The mapping of a session's readable files: proposed by the service, changed by the member, tried out by a preview. */
export function useMapping(session: Session, readable: readonly StoredFile[]) {
  const sessionId = session.id;
  // what the session's present data have stands until the files say otherwise
  const { binWidthMs, windowStartMs } = session;
  const ids = readable.map((file) => file.id).join(' ');
  const proposal = useQuery({
    queryKey: ['proposal', sessionId, ids],
    queryFn: ({ signal }) =>
      requestJson(`/sessions/${sessionId}/intake/proposal`, { schema: intakeProposalSchema, signal }),
    enabled: readable.length > 0,
    placeholderData: keepPreviousData,
    staleTime: Infinity,
  });
  const [changes, setChanges] = useState<Partial<IntakeDraft>>({});
  const draft = useMemo(
    () =>
      mergeDraft(
        draftFromIntake(
          {
            ...(binWidthMs === null ? {} : { binWidthMs }),
            ...(windowStartMs === null ? {} : { windowStartMs }),
            ...proposal.data?.intake,
          },
          readable,
        ),
        changes,
      ),
    [proposal.data, readable, changes, binWidthMs, windowStartMs],
  );
  const outcome = useMemo(() => intakeFromDraft(draft, readable), [draft, readable]);

  const wanted = outcome.intake === null ? null : JSON.stringify(outcome.intake);
  const settled = useSettled(wanted);
  const preview = useQuery({
    queryKey: ['preview', sessionId, settled],
    queryFn: ({ signal }) =>
      requestJson(`/sessions/${sessionId}/intake/preview`, {
        body: { intake: JSON.parse(settled ?? 'null') as unknown, nTrials: nFirstTrials },
        schema: intakePreviewSchema,
        signal,
      }),
    enabled: settled !== null && settled === wanted && proposal.data !== undefined,
    placeholderData: keepPreviousData,
    staleTime: Infinity,
    retryDelay: 3_000,
  });

  return {
    questions: openQuestions(proposal.data),
    /** True until the first proposal is there. */
    isProposing: readable.length > 0 && proposal.data === undefined && proposal.error === null,
    proposalError: proposal.error,
    draft,
    outcome,
    preview: outcome.intake === null ? undefined : preview.data,
    /** True while what is shown is not yet what the mapping says. */
    isPreviewOld: preview.isFetching || settled !== wanted,
    previewError: preview.error,
    isChanged: Object.keys(changes).length > 0,
    change: (change: Partial<IntakeDraft>) => setChanges((before) => ({ ...before, ...change })),
    use: (key: string, use: ArrayUse) =>
      setChanges((before) => ({ ...before, uses: withUse(draft, before.uses ?? {}, key, use) })),
    forgetChanges: () => setChanges({}),
  };
}

/** One array of counts at most: choosing another lets go of the first. */
function withUse(draft: IntakeDraft, changed: Record<string, ArrayUse>, key: string, use: ArrayUse) {
  const uses = { ...changed, [key]: use };
  if (use.kind === 'counts')
    for (const [other, otherUse] of Object.entries(draft.uses))
      if (other !== key && (otherUse.kind === 'counts' || otherUse.kind === 'long'))
        uses[other] = { kind: 'unused' };
  return uses;
}

const inTheSentence = new Set(['binWidthMs', 'windowStartMs', 'counts.long.shape', 'shape']);

/** What the service asks and the page does not already: the sentence of the mapping has its own fields for bins. */
function openQuestions(proposal: IntakeProposal | undefined): IntakeProposal['questions'] {
  return (proposal?.questions ?? []).filter((question) => !inTheSentence.has(question.field));
}

/** A value once it has stopped changing for half a second. */
function useSettled(value: string | null): string | null {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), settleMs);
    return () => clearTimeout(timer);
  }, [value]);
  return settled;
}

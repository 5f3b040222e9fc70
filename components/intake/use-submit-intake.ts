'use client';

import { useMutation } from '@tanstack/react-query';
import { requestJson } from '@/lib/client/request-json';
import type { Intake } from '@/lib/contracts/intake';

/** Sends the mapping to be read and checked in earnest. One key for each try, so that a repeat after a lost answer acts once. */
export function useSubmitIntake(sessionId: string, onDone: () => void) {
  return useMutation({
    mutationFn: ({ intake, acceptWarnings, key }: { intake: Intake; acceptWarnings: boolean; key: string }) =>
      requestJson(`/sessions/${sessionId}/intake`, {
        body: { ...intake, acceptWarnings },
        idempotencyKey: key,
      }),
    retry: 2,
    onSettled: onDone,
  });
}

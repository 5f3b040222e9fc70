'use client';
import { useEffect, useState } from 'react';
import { ApiError } from '@/lib/client/api-error';
import { requestJson } from '@/lib/client/request-json';
import { readoutEstimateSchema, type ReadoutEstimate } from '@/lib/contracts/readout';
import type { RecipeInput } from '@/lib/contracts/recipe';

/** How it stands with the server's check of a recipe. */
export interface EstimateState {
  estimate: ReadoutEstimate | null;
  /** The shown estimate is of an earlier recipe; the answer is on its way. */
  isOld: boolean;
  error: ApiError | null;
}

/** Asks the server what a recipe would take and what is wrong with it, a moment after the last change. */
export function useRecipeEstimate(sessionId: string, recipe: RecipeInput | null): EstimateState {
  const [answer, setAnswer] = useState<{
    body: string;
    estimate: ReadoutEstimate | null;
    error: ApiError | null;
  }>({
    body: '',
    estimate: null,
    error: null,
  });
  const body = recipe ? JSON.stringify(recipe) : '';
  useEffect(() => {
    if (body === '') return;
    const control = new AbortController();
    const timer = setTimeout(() => {
      requestJson(`/sessions/${sessionId}/readouts/estimate`, {
        method: 'POST',
        body: { recipe: JSON.parse(body) as RecipeInput },
        schema: readoutEstimateSchema,
        signal: control.signal,
      }).then(
        (estimate) => setAnswer({ body, estimate, error: null }),
        (error: unknown) => {
          if (!control.signal.aborted && error instanceof ApiError)
            setAnswer({ body, estimate: null, error });
        },
      );
    }, 350);
    return () => {
      clearTimeout(timer);
      control.abort();
    };
  }, [sessionId, body]);
  return { estimate: answer.estimate, isOld: answer.body !== body, error: body === '' ? null : answer.error };
}

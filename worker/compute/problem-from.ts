import type { Problem } from '@/lib/contracts/problem';
import { EngineError } from '@/lib/engine/engine-error';

/** The problem that an engine's refusal tells, or null for any other error. */
export function problemFrom(error: unknown): Problem | null {
  if (!(error instanceof EngineError)) return null;
  return { code: error.code, severity: 'stops', message: error.message, place: { ...error.place } };
}

import { z } from 'zod';
import { ApiError } from '@/lib/client/api-error';
import { errorCodes, type ErrorCode } from '@/lib/errors/app-error';

const problemBodySchema = z.object({
  code: z.string().optional(),
  title: z.string().optional(),
  detail: z.string().optional(),
  errors: z
    .array(z.object({ pointer: z.string().default(''), code: z.string().default(''), detail: z.string() }))
    .optional(),
  requestId: z.string().optional(),
});

function codeOf(status: number, code: string | undefined): ErrorCode {
  const known = (Object.keys(errorCodes) as ErrorCode[]).find((name) => name === code);
  if (known) return known;
  if (status === 502 || status === 504) return 'unavailable';
  return (
    (Object.keys(errorCodes) as ErrorCode[]).find((name) => errorCodes[name].status === status) ?? 'internal'
  );
}

/** Reads a refused response; a body that is no problem+json (a gateway's page) still gives a sentence. */
export async function readApiError(response: Response): Promise<ApiError> {
  let body: unknown = null;
  try {
    body = await response.json();
  } catch {
    body = null;
  }
  const parsed = problemBodySchema.safeParse(body);
  const problem = parsed.success ? parsed.data : {};
  const code = codeOf(response.status, problem.code);
  const title = problem.title ?? errorCodes[code].title;
  return new ApiError({
    status: response.status,
    code,
    title,
    detail: problem.detail ?? `${title}.`,
    faults: problem.errors,
    requestId: problem.requestId ?? response.headers.get('x-request-id'),
  });
}

/** Every code that a request can fail with. Each has a fixed title and status and a page at /problems/<code>. */
export const errorCodes = {
  'malformed-request': { status: 400, title: 'The request cannot be read' },
  unauthenticated: { status: 401, title: 'Sign-in is needed' },
  forbidden: { status: 403, title: 'Your role does not allow this' },
  'not-found': { status: 404, title: 'There is nothing here' },
  conflict: { status: 409, title: 'The present state does not allow this' },
  'stale-version': { status: 412, title: 'Somebody changed this in the meantime' },
  'too-large': { status: 413, title: 'That is too large' },
  'unsupported-format': { status: 415, title: 'This form of content is not understood' },
  'invalid-input': { status: 422, title: 'Some values are not valid' },
  'version-required': { status: 428, title: 'Name the version that you are changing' },
  'rate-limited': { status: 429, title: 'Too many requests' },
  internal: { status: 500, title: 'Something went wrong on our side' },
  unavailable: { status: 503, title: 'A part of the service is away' },
} as const;
export type ErrorCode = keyof typeof errorCodes;

/** One fault inside a request: where (JSON pointer), which, and what to do about it. */
export interface FieldFault {
  pointer: string;
  code: string;
  detail: string;
}

/** An expected failure, told to the caller. `detail` is a sentence that a member can act on. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly faults: FieldFault[];
  readonly retryAfterSeconds: number | undefined;
  /** The only word about an error that a page's error boundary is given; otherwise the framework makes a number of it. */
  digest?: string;

  constructor(
    code: ErrorCode,
    detail: string,
    options: { faults?: FieldFault[]; cause?: unknown; retryAfterSeconds?: number } = {},
  ) {
    super(detail, { cause: options.cause });
    this.name = 'AppError';
    this.code = code;
    this.faults = options.faults ?? [];
    this.retryAfterSeconds = options.retryAfterSeconds;
    if (code === 'unavailable') this.digest = code;
  }

  get status(): number {
    return errorCodes[this.code].status;
  }
}

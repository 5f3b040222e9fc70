import type { ErrorCode, FieldFault } from '@/lib/errors/app-error';

/** A request that the service refused or could not take, read from its problem+json (RFC 9457). `message` is a sentence for people. */
export class ApiError extends Error {
  readonly status: number;
  readonly code: ErrorCode | 'offline';
  readonly title: string;
  readonly faults: FieldFault[];
  readonly requestId: string | null;

  constructor(fields: {
    status: number;
    code: ErrorCode | 'offline';
    title: string;
    detail: string;
    faults?: FieldFault[];
    requestId?: string | null;
  }) {
    super(fields.detail);
    this.name = 'ApiError';
    this.status = fields.status;
    this.code = fields.code;
    this.title = fields.title;
    this.faults = fields.faults ?? [];
    this.requestId = fields.requestId ?? null;
  }

  /** The fault of one field by its JSON pointer (`/name`), or of anything inside it. */
  faultAt(pointer: string): string | undefined {
    return this.faults.find((fault) => fault.pointer === pointer || fault.pointer.startsWith(`${pointer}/`))
      ?.detail;
  }

  /** True where trying again later can help: the service or the line is away. */
  get isPassing(): boolean {
    return (
      this.code === 'offline' ||
      this.code === 'unavailable' ||
      this.code === 'rate-limited' ||
      this.status >= 502
    );
  }
}

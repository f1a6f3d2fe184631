import type { Problem } from '@shared/contracts/common.ts';
import type { FieldError } from '@shared/errors.ts';

/** What went wrong with a call, in words for the person; `code` is for the program. */
export class ApiError extends Error {
  readonly code: string;
  readonly status: number;
  readonly fields: readonly FieldError[];
  readonly details: Readonly<Record<string, unknown>>;
  readonly requestId: string | undefined;

  constructor(problem: Pick<Problem, 'code' | 'detail' | 'status'> & Partial<Problem>) {
    super(problem.detail);
    this.name = 'ApiError';
    this.code = problem.code;
    this.status = problem.status;
    this.fields = problem.fields ?? [];
    this.details = problem.details ?? {};
    this.requestId = problem.requestId;
  }

  get detail(): string {
    return this.message;
  }

  /** The server gave no answer at all: it may or may not have done what was asked. */
  get isUnreachable(): boolean {
    return this.status === 0;
  }
}

export function unreachable(): ApiError {
  return new ApiError({
    code: 'service.unavailable',
    status: 0,
    detail: navigator.onLine
      ? 'The farm server does not answer. Check that it is running, then try again.'
      : 'This device is offline. Get back into the network, then try again.',
  });
}

/** Any thrown thing as an ApiError, so that one component can show it. */
export function toApiError(error: unknown): ApiError {
  if (error instanceof ApiError) return error;
  return new ApiError({
    code: 'server.failed',
    status: 500,
    detail: 'Something did not work here. Load the page again; if it happens again, tell the owner of the farm.',
  });
}

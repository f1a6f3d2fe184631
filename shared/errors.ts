/** Every error code the product raises on purpose, with the HTTP status it is answered with. */
export const ERROR_STATUS = {
  'input.invalid': 400,
  'session.required': 401,
  'session.csrf': 403,
  'sign_in.refused': 401,
  'permission.denied': 403,
  'record.not_found': 404,
  'route.not_found': 404,
  'record.duplicate': 409,
  'record.in_use': 409,
  'rule.refused': 409,
  'stock.not_there': 409,
  'stock.not_enough': 409,
  'stock.withheld': 409,
  'stock.already_reversed': 409,
  'order.wrong_state': 409,
  'order.not_available': 409,
  'pick.wrong_plug': 409,
  'supply.not_enough': 409,
  'token.invalid': 410,
  'edit.stale': 412,
  'upload.too_large': 413,
  'upload.wrong_type': 415,
  'idempotency.mismatch': 422,
  'domain.out_of_range': 422,
  'edit.version_required': 428,
  'rate.limited': 429,
  'server.failed': 500,
  'service.unavailable': 503,
} as const;

export type ErrorCode = keyof typeof ERROR_STATUS;

/** A message that belongs to one field of what was sent, by its dotted path. */
export interface FieldError {
  path: string;
  message: string;
}

/**
 * An error the product raises on purpose. The message tells a person what to do; `fields` says where.
 * `details` is safe to show and never holds secrets.
 */
export class DomainError extends Error {
  readonly code: ErrorCode;
  readonly details: Readonly<Record<string, unknown>>;
  readonly fields: readonly FieldError[];

  constructor(
    code: ErrorCode,
    message: string,
    options: { details?: Record<string, unknown>; fields?: readonly FieldError[] } = {},
  ) {
    super(message);
    this.name = 'DomainError';
    this.code = code;
    this.details = options.details ?? {};
    this.fields = options.fields ?? [];
  }
}

import type { ErrorRequestHandler, RequestHandler } from 'express';

interface Details {
  code?: string;
  param?: string;
}

/** An error answered in the shape of the payment service, so that the SDK throws the class the caller expects. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    readonly type: 'api_error' | 'card_error' | 'idempotency_error' | 'invalid_request_error',
    message: string,
    readonly details: Details = {},
  ) {
    super(message);
    this.name = 'ApiError';
  }

  get body(): { error: Details & { message: string; type: string } } {
    return { error: { ...this.details, message: this.message, type: this.type } };
  }
}

export function invalidRequest(message: string, details: Details = {}): ApiError {
  return new ApiError(400, 'invalid_request_error', message, details);
}

export function noSuch(kind: string, id: string, param: string): ApiError {
  return new ApiError(404, 'invalid_request_error', `No such ${kind}: '${id}'`, { code: 'resource_missing', param });
}

export const answerUnknownUrl: RequestHandler = (req) => {
  const url = `${req.method}: ${req.baseUrl}${req.path}`;
  throw new ApiError(404, 'invalid_request_error', `Unrecognized request URL (${url}).`);
};

export const answerErrors: ErrorRequestHandler = (error, _req, res, next) => {
  if (res.headersSent) return next(error);
  if (error instanceof ApiError) {
    res.status(error.status).json(error.body);
    return;
  }
  console.error(error);
  const failure = new ApiError(500, 'api_error', 'The payments stand-in failed. Its log tells why.');
  res.status(failure.status).json(failure.body);
};

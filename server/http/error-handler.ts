import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import multer from 'multer';
import { ZodError } from 'zod';
import type { Problem } from '../../shared/contracts/common.ts';
import { DomainError, ERROR_STATUS } from '../../shared/errors.ts';
import { domainErrorOf } from '../db/driver-errors.ts';

/** Answers unknown API routes; pages are the client's business. */
export const unknownRoute: RequestHandler = (request) => {
  throw new DomainError('route.not_found', `There is nothing at ${request.method} ${request.path}.`);
};

/** The last middleware: every error becomes problem details. Unexpected ones are logged and answered without their text. */
export const errorHandler: ErrorRequestHandler = (error: unknown, request, response, next) => {
  if (response.headersSent) {
    next(error);
    return;
  }
  const known = knownError(error);
  if (!known) request.log.error({ err: error }, 'request failed');
  sendProblem(
    response,
    known ??
      new DomainError(
        'server.failed',
        'Something went wrong here. Nothing was changed. Try again; if it stays, tell us the request number.',
      ),
    String(request.id),
  );
};

function sendProblem(response: Response, error: DomainError, requestId: string): void {
  const status = ERROR_STATUS[error.code];
  const body: Problem = {
    type: `/problems/${error.code}`,
    title: error.code.replaceAll(/[._]/g, ' '),
    status,
    code: error.code,
    detail: error.message,
    requestId,
    fields: [...error.fields],
    details: { ...error.details },
  };
  const { retryAfterSeconds } = error.details;
  if (typeof retryAfterSeconds === 'number') response.setHeader('Retry-After', String(retryAfterSeconds));
  response.status(status).type('application/problem+json').send(JSON.stringify(body));
}

function knownError(error: unknown): DomainError | null {
  if (error instanceof DomainError) return error;
  if (error instanceof ZodError) return null;
  if (error instanceof multer.MulterError) return uploadError(error);
  return domainErrorOf(error) ?? expressError(error);
}

function uploadError(error: multer.MulterError): DomainError {
  if (error.code === 'LIMIT_FILE_SIZE') return new DomainError('upload.too_large', 'The file is too large.');
  return new DomainError('input.invalid', 'The upload could not be read. Choose one file and send it again.');
}

/** Errors of Express's own parsers and of its file server carry a status and a type; the text may quote the body, so it is not passed on. */
function expressError(error: unknown): DomainError | null {
  if (!(error instanceof Error) || !('status' in error) || typeof error.status !== 'number') return null;
  if (error.status === 404) return new DomainError('route.not_found', 'There is no such file. Reload the page.');
  if (error.status === 413) return new DomainError('upload.too_large', 'This is too much to send at once.');
  if (error.status >= 400 && error.status < 500)
    return new DomainError('input.invalid', 'The request could not be read.');
  return null;
}

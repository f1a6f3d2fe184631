import { ApiError } from './api-error.ts';
import type { PaymentStore } from './store.ts';

interface Answer {
  status: number;
  body: object;
  replayed: boolean;
}

/**
 * Runs a request at most once for a key: the same request again gets the first answer, be it an object or a refusal;
 * another request under the same key is an error. Requests with wrong parameters never come this far and may be
 * mended and sent again under the same key.
 */
export function answerOnce(store: PaymentStore, key: string | null, fingerprint: string, run: () => object): Answer {
  const earlier = key === null ? undefined : store.answers.get(key);
  if (earlier !== undefined) {
    if (earlier.fingerprint !== fingerprint) {
      throw new ApiError(
        400,
        'idempotency_error',
        `Keys for idempotent requests can only be used with the same parameters they were first used with. Try using a key other than '${key}' if you meant to execute a different request.`,
      );
    }
    return { status: earlier.status, body: earlier.body, replayed: true };
  }

  const answer = attempt(run);
  if (key !== null) store.answers.set(key, { fingerprint, ...answer });
  return { ...answer, replayed: false };
}

function attempt(run: () => object): { status: number; body: object } {
  try {
    return { status: 200, body: run() };
  } catch (error) {
    if (error instanceof ApiError) return { status: error.status, body: error.body };
    throw error;
  }
}

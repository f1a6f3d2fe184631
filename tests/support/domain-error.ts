import { DomainError } from '../../shared/errors.ts';

/** The domain error that an act ends with; anything else fails the test. */
export function domainErrorOf(act: () => unknown): DomainError {
  try {
    act();
  } catch (error) {
    if (error instanceof DomainError) return error;
    throw error;
  }
  throw new Error('Expected a domain error, but nothing was refused.');
}

import { DomainError } from '../../shared/errors.ts';

/**
 * Refuses an edit of what someone else changed since the editor saw it.
 *
 * @param ifMatch version that the editor saw
 * @param current the record as it is now, in its contract's shape, so that both versions can be shown
 * @throws {DomainError} `edit.stale`
 */
export function assertVersion(row: { version: number }, ifMatch: number, current: unknown): void {
  if (row.version === ifMatch) return;
  throw new DomainError('edit.stale', 'Someone changed this since you opened it. Compare both versions.', {
    details: { current },
  });
}

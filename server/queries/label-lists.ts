import { DomainError } from '../../shared/errors.ts';

/** What was found, in the order of the codes. @throws {DomainError} `record.not_found` naming what is missing */
export function inGivenOrder<Found>(
  codes: readonly string[],
  byCode: ReadonlyMap<string, Found>,
  noun: string,
): Found[] {
  const missing = codes.filter((code) => !byCode.has(code));
  if (missing.length > 0) {
    const shown = missing.slice(0, 5).join(', ');
    throw new DomainError(
      'record.not_found',
      `There is no ${noun} ${shown}${missing.length > 5 ? ' and others' : ''}.`,
      {
        details: { missing: missing.slice(0, 100) },
      },
    );
  }
  return codes.flatMap((code) => byCode.get(code) ?? []);
}

/** The parts of a list with commas between, each once. */
export function listOf(text: string): string[] {
  const parts = text
    .split(',')
    .map((part) => part.trim())
    .filter((part) => part !== '');
  return [...new Set(parts)];
}

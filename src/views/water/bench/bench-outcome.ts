import { DomainError } from '@shared/errors.ts';
import { BENCH_FIELDS, type BenchNumber } from './bench-fields.ts';
import type { BenchNumbers } from './bench-query.ts';

/** What a calculator found, or why it can't tell. */
export type Outcome<T> = { value: T; problem: null } | { value: null; problem: string };

/** Runs a calculation on the numbers it needs: an empty field or a refusal becomes the words to show. */
export function outcomeOf<Name extends BenchNumber, T>(
  numbers: BenchNumbers,
  needed: readonly Name[],
  calculate: (given: Record<Name, number>) => T,
): Outcome<T> {
  const missing = needed.find((name) => numbers[name] === null);
  if (missing !== undefined) return { value: null, problem: `Fill in ${fieldWords(missing)}.` };
  try {
    // None of the needed ones is empty, as was checked above.
    return { value: calculate(numbers as Record<Name, number>), problem: null };
  } catch (error) {
    if (error instanceof DomainError) return { value: null, problem: error.message };
    throw error;
  }
}

/** The label of a field within a sentence; pH keeps its small letter. */
function fieldWords(name: BenchNumber): string {
  const { label } = BENCH_FIELDS[name];
  return `“${label}”`;
}

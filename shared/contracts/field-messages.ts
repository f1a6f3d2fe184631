import { z } from 'zod';

type RawIssue = Parameters<NonNullable<NonNullable<Parameters<typeof z.config>[0]>['customError']>>[0];

/** Plain words for a field whose schema brings no message of its own. */
export function fieldMessage(issue: RawIssue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      return wrongType(issue.expected, issue.input);
    case 'invalid_union':
      return 'Check this value.';
    case 'invalid_value':
      return 'Choose one of the offered values.';
    case 'too_small':
      if (issue.origin !== 'string') return `Use ${String(issue.minimum)} or more.`;
      return issue.minimum === 1 ? 'Fill this in.' : `Use at least ${String(issue.minimum)} characters.`;
    case 'too_big':
      return issue.origin === 'string'
        ? `Use at most ${String(issue.maximum)} characters.`
        : `Use ${String(issue.maximum)} or less.`;
    case 'unrecognized_keys':
      return `Leave out ${issue.keys.join(', ')}.`;
    case 'invalid_format':
      return 'Check how this is written.';
    default:
      return undefined;
  }
}

function wrongType(expected: string, input: unknown): string {
  if (input === undefined || input === null || input === '') return 'Fill this in.';
  if (expected === 'int') return 'Enter a whole number.';
  if (expected === 'number') return 'Enter a number.';
  return 'Check this value.';
}

/** Sets these words for every contract. Called once at start. */
export function useFieldMessages(): void {
  z.config({ customError: fieldMessage });
}

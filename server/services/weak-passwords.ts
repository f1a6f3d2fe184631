import { readFileSync } from 'node:fs';
import { DomainError } from '../../shared/errors.ts';

/** Rows that fingers and minds run along, both ways. */
const RUNS = [
  '0123456789',
  'abcdefghijklmnopqrstuvwxyz',
  'qwertyuiop',
  'asdfghjkl',
  'zxcvbnm',
  'qwertzuiop',
  'azertyuiop',
];
const SHORTEST_RUN = 3;
/** Characters that must be left when everything easy to guess is taken away. */
const NEEDED_REST = 6;
const NEEDED_DIFFERENT = 5;
const SHORTEST_PERSONAL = 4;

/** Signs that stand for letters; i, l, 1 and their like count as one letter, since either can be meant. */
const LETTER_OF: Readonly<Record<string, string>> = {
  ...{ '0': 'o', '1': 'l', '3': 'e', '4': 'a', '5': 's', '7': 't', '8': 'b' },
  ...{ '@': 'a', $: 's', '!': 'l', '€': 'e', '+': 't', '|': 'l', i: 'l' },
};

/** Words, names, key rows and phrases that guessing programs try first; one a line, in lower-case letters. */
const COMMON_PARTS = readFileSync(new URL('../data/weak-passwords.txt', import.meta.url), 'utf8')
  .split('\n')
  .filter((line) => line !== '')
  .map(folded)
  // Longest first, so that a phrase goes as a whole rather than leaving bits of itself.
  .sort((a, b) => b.length - a.length);

/**
 * Refuses passwords that are easily guessed: well-known ones also with digits for letters or a year behind, repeats, runs
 * along the keyboard, and the person's or the farm's own names. Works without a network.
 *
 * @param known names and addresses that anyone may know about the person
 * @throws {DomainError} `input.invalid` at the field `password`
 */
export function assertStrongPassword(password: string, known: readonly string[]): void {
  const plain = password.normalize('NFKC').toLowerCase();
  if (namesIn(plain, known)) throw refused('Leave out your own name, your e-mail and the name of the farm.');
  if (new Set(plain).size < NEEDED_DIFFERENT) throw refused('Use more different characters.');
  if (repeats(plain)) throw refused('This repeats itself. Use a few words that only you would join.');
  if (restOf(plain) < NEEDED_REST) {
    throw refused('This is one of the first things that others would try. Use a few words that only you would join.');
  }
}

function refused(message: string): DomainError {
  return new DomainError('input.invalid', 'This password is too easy to guess.', {
    fields: [{ path: 'password', message }],
  });
}

/** Digits and signs that stand for letters as those letters; spaces and other signs are dropped. */
function folded(text: string): string {
  return [...text.normalize('NFKD')]
    .map((character) => LETTER_OF[character] ?? character)
    .join('')
    .replaceAll(/[^\p{L}\p{N}]/gu, '');
}

function namesIn(plain: string, known: readonly string[]): boolean {
  const text = folded(plain);
  return known.flatMap(partsOf).some((part) => text.includes(part));
}

/** A name as a whole and its longer words; of an e-mail what stands before the @ as well. */
function partsOf(name: string): string[] {
  const plain = name.normalize('NFKC').toLowerCase();
  const words = plain.includes('@') ? [plain.split('@')[0] ?? ''] : plain.split(/[^\p{L}\p{N}]+/u);
  return [plain, ...words].map(folded).filter((part) => part.length >= SHORTEST_PERSONAL);
}

/** Whether the text is one piece of at most half its length again and again. */
function repeats(plain: string): boolean {
  const inside = `${plain}${plain}`.indexOf(plain, 1);
  return inside < plain.length;
}

/** How much of a password is left without its easy parts, a year or sign at its end left out too. */
function restOf(plain: string): number {
  const text = plain.replace(/[^\p{L}]{1,4}$/u, '');
  // Runs and words overlap (`wer` in `flower`): whichever goes first, the smaller rest counts.
  return Math.min(withoutParts(folded(withoutRuns(text))).length, withoutRuns(withoutParts(folded(text))).length);
}

function withoutParts(text: string): string {
  return COMMON_PARTS.reduce((rest, part) => rest.replaceAll(part, ''), text);
}

function withoutRuns(text: string): string {
  let rest = '';
  for (let at = 0; at < text.length;) {
    const length = runLengthAt(text, at);
    if (length < SHORTEST_RUN) {
      rest += text[at] ?? '';
      at += 1;
    } else at += length;
  }
  return rest;
}

/** How many characters from here on go along one row, forward or back, or are the same one. */
function runLengthAt(text: string, start: number): number {
  const rows = [...RUNS, ...RUNS.map((row) => [...row].reverse().join(''))];
  const first = text[start] ?? '';
  let longest = 1;
  while (text[start + longest] === first) longest += 1;
  for (const row of rows) {
    const place = row.indexOf(first);
    if (place < 0) continue;
    let length = 1;
    while (start + length < text.length && text[start + length] === row[place + length]) length += 1;
    longest = Math.max(longest, length);
  }
  return longest;
}

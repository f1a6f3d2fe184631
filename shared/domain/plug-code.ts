import { DomainError } from '../errors.ts';

/** Crockford's base 32: no I, L, O or U. */
export const PLUG_ALPHABET = '0123456789ABCDEFGHJKMNPQRSTVWXYZ';

export const PLUG_CODE_LENGTH = 7;
const BODY_LENGTH = PLUG_CODE_LENGTH - 1;
const MOST_TRIES = 1000;

/** The alphabet of ISO 7064 MOD 37-2, whose values the check is counted in. */
const CHECK_ALPHABET = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ*';

/** Characters that are read for one another on wet labels and small print. */
const LOOK_ALIKES: Readonly<Record<string, string>> = {
  ...{ U: 'V', V: 'Y', Y: 'V', '2': 'Z', Z: '2', '5': 'S', S: '5', '8': 'B', B: '8', '6': 'G', G: '6' },
  ...{ '0': 'DQ', D: '0', Q: '0', '1': '7', '7': '1', M: 'N', N: 'M', '4': 'A', A: '4' },
};

export type PlugCodeProblem = 'empty' | 'too_short' | 'too_long' | 'wrong_character' | 'wrong_check';

export type ParsedPlugCode = { code: string } | { problem: PlugCodeProblem; suggestion?: string };

/**
 * A new plug code: six random characters and their check. Bodies whose check is not in the alphabet are not issued.
 *
 * @param randomInt a whole number from 0 up to and without `maxExclusive`
 */
export function makePlugCode(randomInt: (maxExclusive: number) => number): string {
  for (let attempt = 0; attempt < MOST_TRIES; attempt += 1) {
    const body = Array.from({ length: BODY_LENGTH }, () => PLUG_ALPHABET.charAt(randomInt(PLUG_ALPHABET.length))).join(
      '',
    );
    const check = checkCharacter(body);
    if (PLUG_ALPHABET.includes(check)) return body + check;
  }
  throw new DomainError('server.failed', 'No plug code could be drawn: the random source does not vary.');
}

/**
 * The ISO 7064 MOD 37-2 check character of a body.
 *
 * @param body digits and capital letters
 * @throws {DomainError} `input.invalid` for any other character
 */
export function checkCharacter(body: string): string {
  const remainder = [...body].reduce((sum, character) => ((sum + checkValue(character)) * 2) % 37, 0);
  return CHECK_ALPHABET.charAt((38 - remainder) % 37);
}

/**
 * Reads what was scanned or typed: a bare code or the whole address of a label, in any case, with spaces or dashes, with
 * O for 0 and I or L for 1. A wrong code comes back with the problem and, where just one near code is right, that one.
 */
export function parsePlugCode(text: string): ParsedPlugCode {
  const folded = fold(text);
  if (folded === '') return { problem: 'empty' };
  if (folded.length < PLUG_CODE_LENGTH) return { problem: 'too_short' };
  if (folded.length > PLUG_CODE_LENGTH) return { problem: 'too_long' };
  if (isPlugCode(folded)) return { code: folded };
  const problem = isInAlphabet(folded) ? 'wrong_check' : 'wrong_character';
  const [suggestion, ...others] = nearCodes(folded);
  return suggestion !== undefined && others.length === 0 ? { problem, suggestion } : { problem };
}

/**
 * The text in the form that codes are stored in, where it has the shape of one: seven characters of the alphabet, be the
 * check right or wrong. Null for everything else.
 */
export function foldPlugCode(text: string): string | null {
  const folded = fold(text);
  return folded.length === PLUG_CODE_LENGTH && isInAlphabet(folded) ? folded : null;
}

/** Whether the text is a plug code exactly as it is stored: seven capital characters with a right check. */
export function isPlugCode(text: string): boolean {
  return (
    text.length === PLUG_CODE_LENGTH &&
    isInAlphabet(text) &&
    checkCharacter(text.slice(0, BODY_LENGTH)) === text.charAt(BODY_LENGTH)
  );
}

/** The code as people read it: '7Q2KX9M' is shown as '7Q2-KX9M'. */
export function formatPlugCode(code: string): string {
  return `${code.slice(0, 3)}-${code.slice(3)}`;
}

/** What a label's QR holds, in capitals so that the compact alphanumeric mode of ISO/IEC 18004 serves. */
export function plugUrl(origin: string, code: string): string {
  return `${origin.replace(/\/+$/, '')}/P/${code}`.toUpperCase();
}

function isInAlphabet(text: string): boolean {
  return [...text].every((character) => PLUG_ALPHABET.includes(character));
}

function fold(text: string): string {
  const inAddress = /\/P\/([^/?#]*)/i.exec(text)?.[1] ?? text;
  return inAddress
    .toUpperCase()
    .replace(/[\s\p{Pd}_.]/gu, '')
    .replace(/O/g, '0')
    .replace(/[IL]/g, '1');
}

/** Right codes one swap of neighbours or one look-alike away. */
function nearCodes(code: string): string[] {
  const characters = [...code];
  const swaps = characters.slice(1).map((character, index) => {
    return code.slice(0, index) + character + code.charAt(index) + code.slice(index + 2);
  });
  const misreadings = characters.flatMap((character, index) =>
    [...(LOOK_ALIKES[character] ?? '')].map((meant) => code.slice(0, index) + meant + code.slice(index + 1)),
  );
  return [...new Set([...swaps, ...misreadings])].filter(isPlugCode);
}

function checkValue(character: string): number {
  const value = CHECK_ALPHABET.indexOf(character);
  if (value < 0 || value > 35) {
    throw new DomainError('input.invalid', 'A code holds digits and letters only.', { details: { character } });
  }
  return value;
}

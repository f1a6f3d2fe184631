import { type PlugCodeProblem, parsePlugCode } from './plug-code.ts';

/** What a scan or a typed code turned out to be. */
export type ScanReading =
  | { kind: 'plug'; code: string }
  | { kind: 'rack' | 'tank' | 'box'; code: string }
  | { kind: 'unknown'; text: string; problem: PlugCodeProblem; suggestion?: string };

const PLACE_KINDS: Readonly<Record<string, 'rack' | 'tank' | 'box'>> = { R: 'rack', T: 'tank', B: 'box' };
const PLACE_CODE = /^[A-Z0-9][A-Z0-9-]{0,15}$/;

/** What a rack label's QR holds; capitals for the compact alphanumeric mode of ISO/IEC 18004. */
export function rackUrl(origin: string, code: string): string {
  return labelUrl(origin, 'R', code);
}

/** What a tank label's QR holds. */
export function tankUrl(origin: string, code: string): string {
  return labelUrl(origin, 'T', code);
}

/** What the QR of a box holds. */
export function boxUrl(origin: string, code: string): string {
  return labelUrl(origin, 'B', code);
}

/** A box by its order and its number among the boxes of it, from 1: `1042-1`. */
export function boxCode(orderNumber: number, box: number): string {
  return `${orderNumber}-${box}`;
}

/** The order whose box this is; null for what is no code of a box. */
export function orderOfBox(code: string): number | null {
  const number = /^(\d{1,9})-\d{1,4}$/.exec(code)?.[1];
  return number === undefined ? null : Number(number);
}

/**
 * Tells plugs from racks, tanks and boxes. The address on a label says which it is; a bare code is a plug where its check is right,
 * otherwise a rack where the farm has one of that code.
 *
 * @param text what the camera, the scanner or the keyboard gave
 * @param isRack whether a code in capitals is one of the farm's racks
 */
export function readScan(text: string, isRack: (code: string) => boolean): ScanReading {
  const [, letter = '', inAddress = ''] = /\/([RTB])\/([^/?#\s]+)/i.exec(text.toUpperCase()) ?? [];
  const kind = PLACE_KINDS[letter];
  if (kind !== undefined && PLACE_CODE.test(inAddress)) return { kind, code: inAddress };

  const bare = text.trim().toUpperCase();
  const plug = parsePlugCode(text);
  if ('code' in plug && !isRack(bare)) return { kind: 'plug', code: plug.code };
  if (PLACE_CODE.test(bare) && isRack(bare)) return { kind: 'rack', code: bare };
  if ('code' in plug) return { kind: 'plug', code: plug.code };
  return { kind: 'unknown', text, ...plug };
}

function labelUrl(origin: string, kind: string, code: string): string {
  return `${origin.replace(/\/+$/, '')}/${kind}/${code}`.toUpperCase();
}

/** Says what is wrong with a code and what to do about it. */
export function explainProblem(problem: PlugCodeProblem): string {
  return {
    empty: 'Type or scan a code.',
    too_short: 'Plug codes have seven characters: some are missing.',
    too_long: 'Plug codes have seven characters: this has more.',
    wrong_character: 'A character here is never used in plug codes.',
    wrong_check: 'A character is wrong: the code does not check out.',
  }[problem];
}

import { type PlugCodeProblem, parsePlugCode } from './plug-code.ts';

/** What a scan or a typed code turned out to be. */
export type ScanReading =
  | { kind: 'plug'; code: string }
  | { kind: 'rack'; code: string }
  | { kind: 'unknown'; text: string; problem: PlugCodeProblem; suggestion?: string };

const RACK_CODE = /^[A-Z0-9][A-Z0-9-]{0,15}$/;

/** What a rack label's QR holds; capitals for the compact alphanumeric mode of ISO/IEC 18004. */
export function rackUrl(origin: string, code: string): string {
  return `${origin.replace(/\/+$/, '')}/R/${code}`.toUpperCase();
}

/**
 * Tells plugs from racks. The address on a label says which it is; a bare code is a plug where its check is right,
 * otherwise a rack where the farm has one of that code.
 *
 * @param text what the camera, the scanner or the keyboard gave
 * @param isRack whether a code in capitals is one of the farm's racks
 */
export function readScan(text: string, isRack: (code: string) => boolean): ScanReading {
  const rackInAddress = /\/R\/([^/?#\s]+)/i.exec(text)?.[1]?.toUpperCase();
  if (rackInAddress !== undefined && RACK_CODE.test(rackInAddress)) return { kind: 'rack', code: rackInAddress };

  const bare = text.trim().toUpperCase();
  const plug = parsePlugCode(text);
  if ('code' in plug && !isRack(bare)) return { kind: 'plug', code: plug.code };
  if (RACK_CODE.test(bare) && isRack(bare)) return { kind: 'rack', code: bare };
  if ('code' in plug) return { kind: 'plug', code: plug.code };
  return { kind: 'unknown', text, ...plug };
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

import { PARAMETER_CODES, type ParameterCode, unitOf, unitsOf } from '../../../shared/domain/units.ts';

/** The first that fits wins. `mg` is magnesium only where it is not part of a unit; units are cut off before. */
const PARAMETER_WORDS: readonly [ParameterCode, RegExp][] = [
  ['alkalinity', /^(alk|alkalinity|kh|dkh|ta)\b/],
  ['calcium', /^(ca|calcium)\b/],
  ['magnesium', /^(mg|magnesium)\b/],
  ['salinity', /^(sal|salinity|sg|specific gravity|density)\b/],
  ['temperature', /^(temp|temperature|water temp)/],
  ['ph', /^ph\b/],
  ['nitrate', /^(nitrate|no3)\b/],
  ['phosphate', /^(phosphate|po4)\b/],
];

/** Units as they are written, for each quantity that can be in more than one. */
const UNIT_WORDS: readonly [ParameterCode, string, RegExp][] = [
  ['alkalinity', 'dKH', /\bd?kh\b|°dh|\bdh\b/],
  ['alkalinity', 'meq/L', /meq|mval|mmol/],
  ['alkalinity', 'ppm', /ppm|mg ?\/ ?l|caco3/],
  ['salinity', 'sg', /\bsg\b|specific gravity|density/],
  ['salinity', 'ppt', /ppt|psu|‰|g ?\/ ?kg/],
  ['temperature', 'F', /°f|\bf\b|fahrenheit/],
  ['temperature', 'C', /°c|\bc\b|celsius/],
];

/** A head or a cell without what stands in brackets, in small letters. */
export function plainWords(text: string): string {
  return text
    .toLowerCase()
    .replace(/[([{].*$/, '')
    .replace(/[_,;:]+/g, ' ')
    .trim();
}

/** The parameter that a head or a cell names. */
export function parameterNamed(text: string): ParameterCode | null {
  const words = plainWords(text);
  const code = PARAMETER_CODES.find((each) => each === words);
  return code ?? PARAMETER_WORDS.find(([, pattern]) => pattern.test(words))?.[0] ?? null;
}

/** The unit of a parameter that a head or a cell names: by its own name or label first, then by words for it. */
export function unitNamed(parameter: ParameterCode, text: string): string | null {
  const bracketed = /[([{](.+?)[)\]}]/.exec(text)?.[1] ?? '';
  const [, ...rest] = text.trim().split(/\s+/);
  const written = [text, bracketed, rest.join(' ')].map(bare);
  const own = unitsOf(parameter).find((name) =>
    written.some((each) => each === bare(name) || each === bare(unitOf(parameter, name).label)),
  );
  if (own !== undefined) return own;
  const words = text.toLowerCase();
  const named = UNIT_WORDS.find(([quantity, , pattern]) => quantity === parameter && pattern.test(words));
  return named?.[1] ?? null;
}

/** Letters as people type them: a micro sign is a u, and blanks do not count. */
function bare(text: string): string {
  return text.toLowerCase().replace(/[µμ]/g, 'u').replace(/₃/g, '3').replace(/\s+/g, '');
}

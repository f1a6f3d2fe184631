import type { LossPatterns } from '@shared/contracts/stock.ts';
import { formatFigures, formatNumber } from '@/formatting/format-number.ts';

type Pattern = LossPatterns['patterns'][number];

const PART_WORDS: Record<Pattern['kind'], (label: string) => string> = {
  system: (label) => label,
  line: (label) => label,
  cutter: (label) => `What ${label} cut`,
};

/** "Long Run lost 14 of 320 plugs where about 4 were expected; by chance alone that comes once in 2,500 times." */
export function patternWords({ kind, label, lost, plugs, expected, p }: Pattern): string {
  const usual = expected < 0.95 ? 'less than one was' : `about ${formatFigures(expected, expected < 10 ? 1 : 2)} were`;
  return `${PART_WORDS[kind](label)} lost ${lost} of ${formatNumber(plugs)} plugs where ${usual} expected; by chance alone that comes ${oddsWords(p)}.`;
}

export function oddsWords(p: number): string {
  if (p < 1e-6) return 'less than once in a million times';
  return `once in ${formatFigures(1 / p, 2)} times`;
}

import { formatNumber } from '@/formatting/format-number.ts';

interface Brings {
  alkalinityMeq: number | null;
  calciumMg: number | null;
  magnesiumMg: number | null;
}

/** What one unit of a supplement brings, such as "1.87 meq of alkalinity a mL"; null where nothing is known. */
export function bringsText({ alkalinityMeq, calciumMg, magnesiumMg }: Brings, unit: string): string | null {
  const parts = [
    { value: alkalinityMeq, words: 'meq of alkalinity' },
    { value: calciumMg, words: 'mg of calcium' },
    { value: magnesiumMg, words: 'mg of magnesium' },
  ].flatMap(({ value, words }) =>
    value !== null && value > 0 ? [`${formatNumber(value, { decimals: value < 10 ? 2 : 1 })} ${words}`] : [],
  );
  return parts.length > 0 ? `${parts.join(', ')} a ${unit}` : null;
}

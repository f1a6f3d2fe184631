import { formatNumber } from '@/formatting/format-number.ts';

/** "1 frag", "412 frags", "2 batches". */
export function plural(count: number, one: string, many = `${one}s`): string {
  return `${formatNumber(count)} ${count === 1 ? one : many}`;
}

/** "a", "a and b", "a, b and c". */
export function joinWords(words: readonly string[]): string {
  const last = words.at(-1) ?? '';
  return words.length < 2 ? last : `${words.slice(0, -1).join(', ')} and ${last}`;
}

import type { WaterItem } from '@shared/contracts/water.ts';
import { formatNumber } from '@/formatting/format-number.ts';

/** Supplies of one kind for a select, the usual one first. */
export function itemChoices(items: readonly WaterItem[], kind: WaterItem['kind']): { value: string; title: string }[] {
  return items
    .filter((item) => item.kind === kind)
    .map(({ id, name, onHand, unit }) => ({ value: id, title: `${name}, ${formatNumber(onHand)} ${unit} in store` }));
}

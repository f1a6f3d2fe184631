import type { BatchCost } from '@shared/contracts/costs.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { plural } from '@/formatting/plural.ts';

export interface CostPart {
  label: string;
  micro: number;
  /** Class of its swatch: solid lime, washed vinegar, dotted cut, hatched rest. */
  look: 'lime' | 'vinegar' | 'cut' | 'other';
}

/** The parts of a batch's cost, those that are nothing left out. */
export function partsOf(cost: BatchCost): CostPart[] {
  const parts: CostPart[] = [
    { label: 'Plugs and glue of the cut', micro: cost.cutMicro, look: 'cut' },
    { label: 'Lime', micro: cost.limeMicro, look: 'lime' },
    { label: 'Vinegar', micro: cost.vinegarMicro, look: 'vinegar' },
    { label: 'Other supplies', micro: cost.otherMicro, look: 'other' },
  ];
  return parts.filter(({ micro }) => micro > 0);
}

/** What the cost of one living frag was made from. */
export function howBatchCostIsMade(cost: BatchCost, money: (micro: number) => string) {
  return {
    inputs: [
      { label: 'All cost so far', value: money(cost.totalMicro), source: 'FIFO cost of the lots' },
      { label: 'Living', value: plural(cost.living, 'frag'), source: 'the stock ledger' },
      { label: 'Left alive', value: plural(cost.leftAlive, 'frag'), source: 'sold, given away or cut again' },
      { label: 'Frag-days', value: formatNumber(cost.fragDays), source: 'one frag in a system for one day' },
    ],
    formula:
      'Cost of a living frag = all cost ÷ (living + left alive). What was lost is carried by the survivors. ' +
      'Lime, vinegar and other supplies used in a system in a month are shared to the batches there by frag-days, ' +
      'to the last micro-unit. A rack counts for the system that it stands in now. Labour and power are not in it.',
  };
}

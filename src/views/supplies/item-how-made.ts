import type { Item } from '@shared/contracts/supplies.ts';
import type { ItemUnit } from '@shared/domain/supply-items.ts';
import { THIN_SPACE, formatFigures, formatNumber } from '@/formatting/format-number.ts';
import { plural } from '@/formatting/plural.ts';

interface HowMade {
  inputs: { label: string; value: string; source?: string }[];
  formula: string;
}

/** What the use, the days left and the order of a supply were made from. */
export function howItemIsMade(item: Item, say: (value: number, unit: ItemUnit) => string): HowMade {
  return { inputs: [...useInputs(item, say), ...orderInputs(item, say)], formula: formulaOf(item) };
}

function useInputs({ use, unit }: Item, say: (value: number, unit: ItemUnit) => string): HowMade['inputs'] {
  const taken = {
    label: `Taken in ${plural(use.windowDays, 'day')}`,
    value: `${say(use.taken, unit)} in ${plural(use.takes, 'take')}`,
    source: 'from the lots',
  };
  const systems = use.systems.map(({ systemCode, litresPerDay, perLitre }) => ({
    label: `System ${systemCode}`,
    value: `${formatFigures(litresPerDay)}${THIN_SPACE}L a day × ${formatFigures(perLitre)}${THIN_SPACE}${unit}/L`,
    source: 'level readings and mixes of its reservoirs',
  }));
  const demand =
    use.demandPerDay === null
      ? []
      : [
          {
            label: 'If limewater brought all that the corals take',
            value: `${say(use.demandPerDay, unit)} a day`,
            source: 'demand of the systems, for comparison',
          },
        ];
  return [...systems, taken, ...demand];
}

function orderInputs(item: Item, say: (value: number, unit: ItemUnit) => string): HowMade['inputs'] {
  const { use, advice, unit } = item;
  const spread = use.sdPerDay > 0 ? [{ label: 'A day differs by (sd)', value: say(use.sdPerDay, unit) }] : [];
  return [
    ...spread,
    { label: 'Lead time and safety', value: `${formatNumber(item.leadTimeDays)} + ${plural(item.safetyDays, 'day')}` },
    { label: 'Reorder point', value: say(advice.reorderPoint, unit) },
    { label: 'An order lasts beyond it', value: plural(60, 'day') },
  ];
}

function formulaOf({ use }: Item): string {
  const rate =
    use.basis === 'limewater'
      ? 'Use a day = litres of limewater a day × amount in a litre, over all systems.'
      : use.basis === 'consumption'
        ? 'Use a day = all that was taken ÷ days; 28 days where they hold four takes or more, else 56.'
        : 'Use a day needs a week of records.';
  return `${rate} Reorder point = use × (lead time + the larger of safety days and 1.64 · √(lead time) · sd ÷ use). Order by = last day on which stock still covers both.`;
}

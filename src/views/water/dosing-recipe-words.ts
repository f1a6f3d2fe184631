import { POWDERS, type PowderCode, powderMolarMass } from '@shared/domain/stock-solutions.ts';
import { formatNumber } from '@/formatting/format-number.ts';

interface Part {
  itemName?: string;
  powder: PowderCode;
  purity: number;
  grams: number;
}

export const STRENGTH_FORMULA = 'strength = grams × purity ÷ molar mass × what a mole brings ÷ litres';
export const STRENGTH_SOURCE =
  'molar masses from CIAAW abridged standard atomic weights; solubilities are handbook figures from memory, about ±10 %';

/** The parts of a recipe as facts. */
export function strengthInputs(
  parts: readonly Part[],
  litres: number,
): { label: string; value: string; source?: string }[] {
  return [
    ...parts.map(({ itemName, powder, purity, grams }) => ({
      label: itemName ?? POWDERS[powder].label,
      value: `${formatNumber(grams, { decimals: 1 })} g at ${formatNumber(purity * 100, { decimals: 1 })} %`,
      source: `${POWDERS[powder].formula}, ${formatNumber(powderMolarMass(powder), { decimals: 2 })} g/mol`,
    })),
    { label: 'Filled up to', value: `${formatNumber(litres, { decimals: 2 })} L` },
  ];
}

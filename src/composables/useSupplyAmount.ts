import type { ItemUnit } from '@shared/domain/supply-items.ts';
import type { Quantity } from '@shared/domain/units.ts';
import { THIN_SPACE, formatNumber } from '@/formatting/format-number.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';

const QUANTITIES: Partial<Record<ItemUnit, Quantity>> = { g: 'mass', mL: 'liquid' };

/** Amounts of supplies in the unit that the person chose; pieces are only counted. */
export function useSupplyAmount() {
  const units = useUnitChoicesStore();

  function quantityOf(unit: ItemUnit): Quantity | undefined {
    return QUANTITIES[unit];
  }

  function labelOf(unit: ItemUnit): string {
    const quantity = QUANTITIES[unit];
    return quantity ? units.labelFor(quantity) : 'pieces';
  }

  /** "1,240 g", "7.5 g", "12 pieces": as many decimals as tell something. */
  function say(value: number, unit: ItemUnit): string {
    const quantity = QUANTITIES[unit];
    const shown = quantity ? units.toShown(quantity, value) : value;
    const label = shown === 1 && unit === 'piece' ? 'piece' : labelOf(unit);
    return `${formatNumber(shown, { decimals: decimalsOf(shown) })}${THIN_SPACE}${label}`;
  }

  return { say, labelOf, quantityOf };
}

function decimalsOf(value: number): number {
  if (Number.isInteger(value) || Math.abs(value) >= 100) return 0;
  return Math.abs(value) >= 10 ? 1 : 2;
}

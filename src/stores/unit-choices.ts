import { useLocalStorage } from '@vueuse/core';
import { defineStore } from 'pinia';
import { type Quantity, fromCanonical, toCanonical, unitOf, unitsOf } from '@shared/domain/units.ts';
import { type QuantityOptions, formatQuantity } from '@/formatting/format-quantity.ts';

/** What most reef people read; everything else starts with the stored unit. */
const USUAL: Partial<Record<Quantity, string>> = { alkalinity: 'dKH' };

/** The unit of each quantity that the person chose on this device. Values are stored and sent in canonical units. */
export const useUnitChoicesStore = defineStore('unit-choices', () => {
  const choices = useLocalStorage<Partial<Record<Quantity, string>>>('limestead.units', {});

  function unitFor(quantity: Quantity): string {
    const names = unitsOf(quantity);
    const chosen = choices.value[quantity] ?? USUAL[quantity];
    // A unit kept from an older version may not exist any more.
    return chosen !== undefined && names.includes(chosen) ? chosen : (names[0] ?? '');
  }

  function labelFor(quantity: Quantity): string {
    return unitOf(quantity, unitFor(quantity)).label;
  }

  function choose(quantity: Quantity, unit: string): void {
    choices.value = { ...choices.value, [quantity]: unit };
  }

  /** A stored value as a number in the person's unit. */
  function toShown(quantity: Quantity, canonical: number): number {
    return fromCanonical(quantity, canonical, unitFor(quantity));
  }

  /** What the person typed, as it is stored. */
  function fromShown(quantity: Quantity, shown: number): number {
    return toCanonical(quantity, shown, unitFor(quantity));
  }

  /** A stored value with its unit in one text, for sentences. */
  function say(quantity: Quantity, canonical: number | null | undefined, options?: QuantityOptions): string {
    return formatQuantity(quantity, unitFor(quantity), canonical, options);
  }

  return { choices, unitFor, labelFor, choose, toShown, fromShown, say };
});

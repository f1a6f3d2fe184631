import { decimalsForError } from '@/formatting/format-number.ts';
import { quantityParts } from '@/formatting/format-quantity.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import type { DemandWords } from '@/views/water/demand-sentence.ts';

/** Amounts of alkalinity in the unit that the person chose. */
export function demandWords(units: ReturnType<typeof useUnitChoicesStore>): DemandWords {
  const unit = () => units.unitFor('alkalinity');
  const decimalsOf = (error: number) => (error > 0 ? decimalsForError(units.toShown('alkalinity', error)) : 2);
  return {
    rate: (rate, error) =>
      units.say('alkalinity', rate, { error, difference: true, ...(error > 0 ? {} : { decimals: 2 }) }),
    bare: (rate, error) => {
      return quantityParts('alkalinity', unit(), rate, { difference: true, decimals: decimalsOf(error) }).value;
    },
    rounded: (rate, error) => {
      const places = 10 ** decimalsOf(error);
      return units.fromShown('alkalinity', Math.round(units.toShown('alkalinity', rate) * places) / places);
    },
    level: (level) => units.say('alkalinity', level),
  };
}

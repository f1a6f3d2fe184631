import { decimalsForError } from '@/formatting/format-number.ts';
import { quantityParts } from '@/formatting/format-quantity.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import type { DemandWords } from '@/views/water/demand-sentence.ts';

/** Amounts of alkalinity in the unit that the person chose. */
export function demandWords(units: ReturnType<typeof useUnitChoicesStore>): DemandWords {
  const unit = () => units.unitFor('alkalinity');
  return {
    rate: (rate, error) =>
      units.say('alkalinity', rate, { error, difference: true, ...(error > 0 ? {} : { decimals: 2 }) }),
    bare: (rate, error) => {
      const decimals = error > 0 ? decimalsForError(units.toShown('alkalinity', error)) : 2;
      return quantityParts('alkalinity', unit(), rate, { difference: true, decimals }).value;
    },
    level: (level) => units.say('alkalinity', level),
  };
}

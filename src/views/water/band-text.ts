import type { TargetBand } from '@shared/contracts/systems.ts';
import { quantityParts } from '@/formatting/format-quantity.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';

/** A target band in the unit that the person chose, "7.9–8.7". */
export function bandText({ parameter, low, high }: TargetBand, units: ReturnType<typeof useUnitChoicesStore>): string {
  const unit = units.unitFor(parameter);
  return `${quantityParts(parameter, unit, low).value}–${quantityParts(parameter, unit, high).value}`;
}

import type { SystemOverfill } from '@shared/contracts/overfills.ts';
import type { AdvicePart } from '@shared/domain/dosing-plan/advice-words.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { quantityParts } from '@/formatting/format-quantity.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';

type Units = ReturnType<typeof useUnitChoicesStore>;
type Chem = NonNullable<SystemOverfill['effect']>['before'];

const ph = (value: number) => formatNumber(value, { decimals: 2 });

/** What would happen, in a sentence. */
export function overfillSentence(risk: SystemOverfill, units: Units): AdvicePart[] {
  const { reservoir, effect, litres, largest } = risk;
  if (!reservoir) return [{ text: 'No limewater stands ready for this system, so none can run in.' }];
  const amount = units.say('volume', litres, { decimals: 0 });
  if (litres === 0) return [{ text: `${reservoir.code} holds nothing above its intake, so nothing can run in.` }];
  if (!effect) return [{ text: largest ? beyond(reservoir.code, amount) : DOUBTFUL }];
  const change = effect.equilibrated.alkalinityMeqL - effect.before.alkalinityMeqL;
  return [
    { text: `${amount} of ${reservoir.code} at once would lift the pH from ${ph(effect.before.phNbs)} to ` },
    { text: ph(effect.atOnce.phNbs), strong: true },
    { text: ' and change alkalinity by ' },
    { text: units.say('alkalinity', change, { difference: true, decimals: 1 }), strong: true },
    { text: risk.broken.length === 0 ? ', within your limits.' : '.' },
  ];
}

const DOUBTFUL = 'The latest tests can’t all be true of one water, so nothing can be worked out. Test again.';

function beyond(code: string, amount: string): string {
  return `${amount} of ${code} at once would be so much that the water could not be called seawater any more.`;
}

/** How much may stand in the reservoir; null where all of it may. */
export function largestText({ reservoir, largest, netVolumeL }: SystemOverfill, units: Units): string | null {
  if (!reservoir || !largest || largest.stoppedBy === null) return null;
  if (largest.litres < netVolumeL * 1e-4) return 'The water is at a limit already: not even a little may run in.';
  const most = units.say('volume', largest.litres, { decimals: 0 });
  return `At most ${most} at once keep the water within your limits: a smaller reservoir, a pump that stops by itself, or a second float that cuts off on its own.`;
}

export const BROKEN_LABELS = {
  ph: 'pH over the limit',
  omega: 'chalk drops out',
  change: 'alkalinity jumps',
  beyond: 'grave',
} as const;

/** Rows of the table: what is measured in which unit, before, when mixed and in balance with the room. */
export function effectRows(
  { effect }: SystemOverfill,
  units: Units,
): { label: string; unit: string; values: string[] }[] {
  if (!effect) return [];
  const all = [effect.before, effect.atOnce, effect.equilibrated];
  const inUnit = (label: string, quantity: 'alkalinity' | 'calcium' | 'salinity', of: (chem: Chem) => number) => ({
    ...{ label, unit: units.labelFor(quantity) },
    values: all.map((chem) => quantityParts(quantity, units.unitFor(quantity), of(chem)).value),
  });
  return [
    { label: 'pH', unit: '', values: all.map(({ phNbs }) => ph(phNbs)) },
    inUnit('Alkalinity', 'alkalinity', ({ alkalinityMeqL }) => alkalinityMeqL),
    {
      ...{ label: 'Aragonite', unit: 'Ω' },
      values: all.map(({ omegaAragonite }) => formatNumber(omegaAragonite, { decimals: 1 })),
    },
    inUnit('Calcium', 'calcium', ({ calciumMgL }) => calciumMgL),
    inUnit('Salinity', 'salinity', ({ salinity }) => salinity),
  ];
}

import { SETTLING_MS } from './reservoir-state.ts';
import { MS_PER_HOUR } from './days.ts';

/** What a mix is made of. */
export interface MixToMake {
  waterL: number;
  limeG: number;
  vinegarMl: number;
}

/** Amounts in the units of whoever reads them. */
export interface AmountWords {
  litres: (amountL: number) => string;
  grams: (amountG: number) => string;
  millilitres: (amountMl: number) => string;
}

export interface MixingStep {
  code: 'protect' | 'water' | 'lime' | 'stir' | 'vinegar' | 'cover' | 'label' | 'settle';
  /** What to do. */
  text: string;
  /** Why, or what to mind. */
  mind: string;
}

const SETTLING_HOURS = SETTLING_MS / MS_PER_HOUR;

/**
 * The order of work of a mix of limewater: water, then powder, vinegar last. Common practice, no source; the cautions are
 * those of the safety sheets of calcium hydroxide (ICSC 0408).
 *
 * @param spoons the lime in level spoons of the farm's own, as words; null where no spoon was weighed
 */
export function mixingSteps(
  { waterL, limeG, vinegarMl }: MixToMake,
  words: AmountWords,
  spoons: string | null = null,
): MixingStep[] {
  const lime: MixingStep[] = [
    {
      code: 'lime',
      text: `Sprinkle in ${words.grams(limeG)} of lime${spoons === null ? '' : ` (${spoons})`}.`,
      mind: 'Powder into water, slowly and low over it, so that no dust rises. Never water onto powder.',
    },
    {
      code: 'stir',
      text: 'Stir gently for a few minutes.',
      mind: 'Enough to wet all of the powder; splashing takes carbon dioxide in.',
    },
  ];
  const vinegar: MixingStep[] = [
    {
      code: 'vinegar',
      text: `Pour in ${words.millilitres(vinegarMl)} of vinegar, slowly, and stir.`,
      mind: 'Last, a little at a time. No other acid, and no bleach near it.',
    },
  ];
  return [
    {
      code: 'protect',
      text: 'Put on goggles and gloves, and a dust mask for the powder.',
      mind: 'Lime and limewater burn eyes and skin. Have water to rinse with at hand.',
    },
    {
      code: 'water',
      text: `Fill in ${words.litres(waterL)} of RO/DI water.`,
      mind: 'Water first. Keep plugs, leads and hands dry; pumps off at a breaker with earth-leakage protection.',
    },
    ...(limeG > 0 ? lime : []),
    ...(vinegarMl > 0 ? vinegar : []),
    { code: 'cover', text: 'Cover it.', mind: 'Air turns limewater into chalk. Leave the film on top where it is.' },
    {
      code: 'label',
      text: 'Label it: limewater, caustic, the day, the grams and the litres.',
      mind: 'So that nobody takes it for water. Keep it away from children and strong acids.',
    },
    ...(limeG > 0
      ? [
          {
            code: 'settle' as const,
            text: `Let it settle ${SETTLING_HOURS} hours or more.`,
            mind: 'Then draw only the clear part, above the sediment.',
          },
        ]
      : []),
  ];
}

/** The usual cautions beside a mix; the product's own safety sheet and local rules come first. */
export const MIXING_CAUTIONS = [
  'Lime and limewater are caustic: they burn eyes and skin. Wear goggles and gloves, and don’t raise dust.',
  'In the eyes: rinse with water for many minutes, take out lenses, then see a doctor. On skin: rinse well. Swallowed: rinse the mouth, don’t make anyone vomit, get medical help.',
  'No acid other than the vinegar of this mix, and no quicklime: it heats on wetting.',
  'Salt water and electricity: earth-leakage protection on every circuit, drip loops, dry hands. Leave fixed wiring to a licensed electrician.',
  'The product’s own safety sheet and the local rules come first; this is no substitute for them.',
] as const;

/** Part by which a level spoon may be off: powders pack and heap differently (common practice, no source). */
export const SPOON_ERROR = 0.25;

/** A level US teaspoon of lime, g: 4.93 mL at a bulk density of 450–650 kg/m³. */
export const USUAL_SPOON_G = { least: 2.2, most: 3.2 } as const;

/** More spoons than this nobody counts. */
const MOST_SPOONS = 40;

/**
 * Lime in level spoons, to the nearest half, as words.
 *
 * @param spoonG what a level spoon of the farm's holds, as weighed, g; null where nobody weighed one
 * @returns null where spoons tell nothing: no spoon, no lime, or far too many to count
 */
export function spoonWords(limeG: number, spoonG: number | null): string | null {
  if (spoonG === null) return null;
  const spoons = Math.round((2 * limeG) / spoonG) / 2;
  if (spoons === 0 || spoons > MOST_SPOONS) return null;
  return `about ${spoons} level ${spoons === 1 ? 'spoon' : 'spoons'}`;
}

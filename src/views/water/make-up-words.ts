import type { Cartridge, MakeUpWater } from '@shared/contracts/make-up-water.ts';
import type { CartridgeStage } from '@shared/domain/cartridges.ts';
import type { Sentence } from '@/components/sentence.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { joinWords, plural } from '@/formatting/plural.ts';

export const STAGE_WORDS: Record<CartridgeStage, string> = {
  sediment: 'Sediment',
  carbon: 'Carbon',
  membrane: 'Membrane',
  resin: 'Resin',
};

export const LIMIT_WORDS: Record<CartridgeStage, { label: string; unit: string } | null> = {
  sediment: null,
  carbon: null,
  membrane: { label: 'Replace below a rejection of', unit: '%' },
  resin: { label: 'Replace when TDS leaves it above', unit: 'mg/L' },
};

/** How pure the water is, and what to replace first. */
export function makeUpSentence(
  { readings, cartridges, litresPerDay }: MakeUpWater,
  sayLitres: (litres: number) => string,
): Sentence {
  const out = readings.find(({ tdsOut }) => tdsOut !== null);
  if (!out || out.tdsOut === null) {
    const after = 'Not measured yet. Log the TDS before the unit, after the membrane and as it leaves.';
    return { before: '', number: '', after };
  }
  const made = litresPerDay === null ? '' : `; about ${sayLitres(litresPerDay)} a day are made`;
  return {
    before: 'The make-up water leaves at ',
    number: `${formatNumber(out.tdsOut, { decimals: out.tdsOut % 1 === 0 ? 0 : 1 })} mg/L`,
    after: ` of dissolved solids${made}.${careWords(cartridges)}`,
  };
}

function careWords(cartridges: readonly Cartridge[]): string {
  const named = (state: Cartridge['state']) =>
    cartridges.filter((each) => each.state === state).map(({ stage }) => STAGE_WORDS[stage].toLowerCase());
  const [due, soon] = [named('due'), named('soon')];
  if (due.length > 0) return ` Replace the ${joinWords(due)} now.`;
  if (soon.length > 0) return ` The ${joinWords(soon)} ${soon.length === 1 ? 'is' : 'are'} due soon.`;
  return cartridges.length > 0 ? ' No cartridge is due.' : ' Write down which cartridges are in it.';
}

/** What a cartridge has behind it and what ends it, in words. */
export function lifeWords(
  { daysUsed, litresUsed, lifeDays, lifeL, limit, stage }: Cartridge,
  sayLitres: (litres: number) => string,
): string {
  const days = lifeDays === null ? plural(daysUsed, 'day') : `${formatNumber(daysUsed)} of ${plural(lifeDays, 'day')}`;
  const litres = lifeL === null ? sayLitres(litresUsed) : `${sayLitres(litresUsed)} of ${sayLitres(lifeL)}`;
  const limits = LIMIT_WORDS[stage];
  const end =
    limits === null || limit === null
      ? ''
      : stage === 'membrane'
        ? `, or below ${formatNumber(limit)} % rejection`
        : `, or above ${formatNumber(limit)} mg/L`;
  return `${days}, ${litres}${end}`;
}

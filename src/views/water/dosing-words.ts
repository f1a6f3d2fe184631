import type { DosingRate } from '@shared/contracts/dosing.ts';
import type { WaterItem } from '@shared/contracts/water.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import { formatNumber } from '@/formatting/format-number.ts';

type Window = DosingRate['window'];

/** "22:00 to 06:00", or "all day". */
export function windowWords(window: Window): string {
  if (window === null) return 'all day';
  return `${clockWords(window.startMinute)} to ${clockWords(window.endMinute)}`;
}

/** Minutes after midnight as a clock shows them. */
export function clockWords(minute: number): string {
  const two = (value: number) => String(value).padStart(2, '0');
  return `${two(Math.floor(minute / 60))}:${two(minute % 60)}`;
}

/** Minutes after midnight from what a time field holds; null where it is no time. */
export function minuteOf(clock: string): number | null {
  const match = /^(\d{1,2}):(\d{2})$/.exec(clock);
  if (!match) return null;
  const minute = Number(match[1]) * 60 + Number(match[2]);
  return minute < 1440 ? minute : null;
}

/** What a steady dose brings a system in a day, such as "0.42 dKH and 3 mg/L calcium". */
export function bringsADay({ brings }: DosingRate, sayAlkalinity: (meqL: number) => string): string {
  const parts = [
    brings.alkalinityMeqL > 0 ? sayAlkalinity(brings.alkalinityMeqL) : null,
    brings.calciumMgL > 0 ? `${formatNumber(brings.calciumMgL, { decimals: 1 })} mg/L calcium` : null,
    brings.magnesiumMgL > 0 ? `${formatNumber(brings.magnesiumMgL, { decimals: 1 })} mg/L magnesium` : null,
  ].filter((part) => part !== null);
  return parts.length > 0 ? `${parts.join(' and ')} a day` : 'nothing that is counted';
}

/**
 * What an amount of a supplement raises, such as "Raises 0.42 dKH and 3 mg/L calcium."
 *
 * @param perL of the supplement's unit, in each litre of the system
 * @returns null where it brings nothing that is counted
 */
export function riseWords(
  { strength, calciumMg, magnesiumMg }: WaterItem,
  perL: number,
  units: ReturnType<typeof useUnitChoicesStore>,
): string | null {
  const say = (quantity: 'alkalinity' | 'calcium' | 'magnesium', each: number | null, decimals: number) =>
    each ? [units.say(quantity, each * perL, { decimals, difference: true })] : [];
  const parts = [
    ...say('alkalinity', strength, 2),
    ...say('calcium', calciumMg, 1).map((text) => `${text} calcium`),
    ...say('magnesium', magnesiumMg, 1).map((text) => `${text} magnesium`),
  ];
  return parts.length > 0 ? `Raises ${parts.join(' and ')}` : null;
}

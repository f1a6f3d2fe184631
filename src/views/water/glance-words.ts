import type { LatestValue, SystemGlance } from '@shared/contracts/water.ts';
import type { WaterSystem } from '@shared/contracts/water-overview.ts';
import type { TodayGroup, TodayText } from '@shared/contracts/today.ts';
import { MS_PER_DAY } from '@shared/domain/days.ts';
import type { Tone } from '@/components/tone.ts';
import { type DemandWords, driftOf, netOf, shownChange } from '@/views/water/demand-sentence.ts';

export const ALERT_TONES: Record<TodayGroup, Tone> = { now: 'brick', today: 'ochre', soon: 'slate' };

export function alkalinityOf({ latest }: SystemGlance): LatestValue | undefined {
  return latest.find(({ parameter }) => parameter === 'alkalinity');
}

/** The part of the demand that limewater carries, 0 and above; null where either is not known, or none is online. */
export function limeShareOf({ demand, carried, online }: SystemGlance): number | null {
  if (!online || !demand.enough || demand.low <= 0 || carried.limewater === null) return null;
  return carried.limewater / demand.demand;
}

/** What alkalinity does, with its number where the tests can tell one: "slips 0.09 a day". */
export function movementOf(glance: SystemGlance, words: DemandWords): string {
  const drift = driftOf(glance);
  const { demand, carried } = glance;
  const net = netOf(glance);
  if (!demand.enough || !net || drift === 'unknown') return 'not known yet';
  if (drift === 'holds') return 'holds';
  return `${drift} ${words.bare(Math.abs(shownChange({ demand, carried }, words)), net.error)} a day`;
}

/** What to do about a system that has no alert, in a few words. */
export function nextOf(glance: WaterSystem, now: number): string {
  const drift = driftOf(glance);
  const { online, standby } = glance;
  if (online !== null && online.emptyAt !== null && online.emptyAt < now + MS_PER_DAY) {
    return standby > 0 ? 'Put the next reservoir online.' : 'Mix limewater: no other reservoir is ready.';
  }
  if (!alkalinityOf(glance)) return 'Test alkalinity to begin.';
  if (drift === 'unknown') {
    return glance.demand.enough ? 'Log the level of its reservoir.' : 'Test alkalinity on three days.';
  }
  if (drift !== 'slips' && drift !== 'rises') return 'Nothing to do.';
  return 'See the system for the mix that would hold it.';
}

/** An alert's title without the name of the system at its start. */
export function withoutName(title: TodayText, name: string): TodayText {
  const [first, ...rest] = title;
  const prefix = `${name}: `;
  if (typeof first !== 'string' || !first.startsWith(prefix)) return title;
  const said = first.slice(prefix.length);
  return [said.charAt(0).toUpperCase() + said.slice(1), ...rest];
}

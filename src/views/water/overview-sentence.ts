import type { SystemGlance } from '@shared/contracts/water.ts';
import { systemTitle } from '@shared/domain/system-title.ts';
import { type LevelFacts, byUrgency } from '@shared/domain/water-urgency.ts';
import { joinWords, plural } from '@/formatting/plural.ts';
import { type DemandWords, driftOf, netOf, shownChange } from '@/views/water/demand-sentence.ts';
import { alkalinityOf } from '@/views/water/glance-words.ts';

/** So many systems are named with their numbers; the rest is counted. */
const MOST_NAMED = 3;

/** What stands out over all systems, the most urgent first, with its number. */
export function overviewSentence(glances: readonly SystemGlance[], words: DemandWords): string {
  const pressing = glances
    .filter((glance) => isOut(glance) || isMoving(glance))
    .sort((a, b) => byUrgency(factsOf(a), factsOf(b)));
  const unknown = glances.filter((glance) => driftOf(glance) === 'unknown');
  const said = pressing
    .slice(0, MOST_NAMED)
    .map((glance) => `${systemTitle(glance.system)} ${stateOf(glance, words)}.`);
  const left = pressing.length - said.length;
  if (left > 0) said.push(`${plural(left, 'more system moves', 'more systems move')}.`);
  if (pressing.length === 0 && unknown.length < glances.length) {
    const steady = plural(glances.length - unknown.length, 'system');
    said.push(`Alkalinity is where it should be in ${steady}.`);
  }
  if (unknown.length > 0) {
    const names = unknown.map(({ system }) => systemTitle(system));
    said.push(`What alkalinity does is not known yet in ${joinWords(names)}.`);
  }
  return said.join(' ');
}

function stateOf(glance: SystemGlance, words: DemandWords): string {
  const latest = alkalinityOf(glance);
  const level = latest?.band && isOut(glance) ? [`is ${latest.state} its band at ${words.level(latest.value)}`] : [];
  return joinWords([...level, ...movement(glance, words)]);
}

function movement(glance: SystemGlance, words: DemandWords): string[] {
  const { demand, carried } = glance;
  const net = netOf(glance);
  if (!demand.enough || !net || !isMoving(glance)) return [];
  const change = words.bare(Math.abs(shownChange({ demand, carried }, words)), net.error);
  return [`${net.change < 0 ? 'slips' : 'rises'} ${change} a day`];
}

function isOut(glance: SystemGlance): boolean {
  const state = alkalinityOf(glance)?.state;
  return state === 'below' || state === 'above';
}

function isMoving(glance: SystemGlance): boolean {
  const drift = driftOf(glance);
  return drift === 'slips' || drift === 'rises';
}

/** The level with its band and how it changes now, for the order of urgency. */
function factsOf(glance: SystemGlance): LevelFacts | null {
  const latest = alkalinityOf(glance);
  return latest ? { level: latest.value, band: latest.band, changePerDay: netOf(glance)?.change ?? null } : null;
}

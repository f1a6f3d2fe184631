import type { SystemGlance } from '@shared/contracts/water.ts';
import { joinWords, plural } from '@/formatting/plural.ts';
import { driftOf } from '@/views/water/demand-sentence.ts';

/** What stands out over all systems, the worst first. */
export function overviewSentence(glances: readonly SystemGlance[]): string {
  const out = glances.filter(
    ({ latest }) => alkalinityState(latest) === 'below' || alkalinityState(latest) === 'above',
  );
  const slipping = glances.filter(({ demand }) => driftOf(demand) === 'slips');
  const rising = glances.filter(({ demand }) => driftOf(demand) === 'rises');
  const unknown = glances.filter(({ demand }) => !demand.enough);
  const said = [
    ...(out.length > 0 ? [`Alkalinity is out of its band in ${names(out)}.`] : []),
    ...(slipping.length > 0 ? [`It slips in ${names(slipping)}.`] : []),
    ...(rising.length > 0 ? [`It rises in ${names(rising)}.`] : []),
  ];
  if (said.length === 0) said.push(`Alkalinity is where it should be in ${plural(glances.length, 'system')}.`);
  if (unknown.length > 0) said.push(`Demand is not known yet in ${names(unknown)}.`);
  return said.join(' ');
}

function alkalinityState(latest: SystemGlance['latest']): string | undefined {
  return latest.find(({ parameter }) => parameter === 'alkalinity')?.state;
}

function names(glances: readonly SystemGlance[]): string {
  return joinWords(glances.map(({ system }) => system.name));
}

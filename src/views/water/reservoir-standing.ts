import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { joinWords } from '@/formatting/plural.ts';

type Standing = Pick<Reservoir, 'code' | 'state' | 'usableL' | 'strengthLow' | 'alkalinityMeqL'>;

/** Whether a system has what the habit wants: one reservoir online, and one that stands ready to follow it. */
export function reservoirStanding(reservoirs: readonly Standing[]): { text: string; off: boolean } | null {
  if (reservoirs.length === 0) return null;
  const online = reservoirs.find(({ state }) => state === 'online');
  const weak = reservoirs.filter(({ strengthLow }) => strengthLow).map(({ code }) => code);
  const ready = reservoirs.find(
    ({ state, usableL, alkalinityMeqL }) => state === 'standby' && usableL > 0 && alkalinityMeqL > 0,
  );
  const settling = reservoirs.find(({ state }) => state === 'settling');
  if (!online) return { text: `None is online, so it gets no limewater. ${nextAct(ready, settling)}`, off: true };
  if (weak.length > 0) return { text: `${joinWords(weak)} tested weak: mix a fresh one.`, off: true };
  if (ready) return { text: `${online.code} is online and ${ready.code} stands ready.`, off: false };
  if (settling) return { text: `${online.code} is online; ${settling.code} settles to follow it.`, off: false };
  return { text: `${online.code} is online and nothing stands ready to follow it. Mix the next one.`, off: true };
}

function nextAct(ready: Standing | undefined, settling: Standing | undefined): string {
  if (ready) return `${ready.code} is ready: put it online.`;
  return settling ? `${settling.code} still settles.` : 'Mix one.';
}

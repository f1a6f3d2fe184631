import type { LossCause, LossSeen } from '../../shared/domain/losses.ts';
import type { Chance } from './chance.ts';
import { HEAT_LOSSES } from './heat.ts';
import type { DemoBatch, DemoPlug, World } from './world.ts';

/** A plug that will be found dead on a day. */
export interface Death {
  plug: DemoPlug;
  index: number;
  seen: LossSeen;
  cause: LossCause;
}

/** Half of those that die do so while the cut heals. */
const EARLY_PART = 0.5;
const EARLY_DAYS = 14;
const LATE_DAYS = 180;

type Kind = readonly [LossCause, LossSeen, number];
const EARLY: readonly Kind[] = [
  ['cut_stress', 'stn', 40],
  ['cut_stress', 'rtn', 12],
  ['plug_fall', 'detached', 20],
  ['unknown', 'missing', 14],
  ['smothering', 'overgrown', 14],
];
const LATE: readonly Kind[] = [
  ['unknown', 'stn', 26],
  ['smothering', 'overgrown', 18],
  ['predation', 'bite_marks', 10],
  ['plug_fall', 'missing', 12],
  ['light_step', 'bleached', 12],
  ['sting', 'base_recession', 8],
  ['water_event', 'tip_burn', 8],
  ['unknown', 'browned', 6],
];
const ROUGH_PART = 0.3;

/** Which pieces of a new batch will die by themselves, when, and what will be seen. */
export function deathsOf(batch: DemoBatch, chance: Chance, rough: boolean): Death[] {
  return batch.plugs.flatMap((plug): Death[] => {
    if (rough && chance.happens(ROUGH_PART)) {
      const seen = chance.happens(0.5) ? 'broken' : 'detached';
      return [{ plug, index: batch.cutIndex + 1 + chance.int(5), seen, cause: 'handling' }];
    }
    if (chance.happens(batch.line.survival)) return [];
    const early = chance.happens(EARLY_PART);
    const age = early ? 1 + chance.int(EARLY_DAYS) : EARLY_DAYS + 1 + chance.int(LATE_DAYS - EARLY_DAYS);
    const [cause, seen] = weighted(early ? EARLY : LATE, chance);
    return [{ plug, index: batch.cutIndex + age, seen, cause }];
  });
}

/** Which pieces of a system die of the heat, in the days after it. */
export function heatDeaths(world: World, systemCode: string, index: number, chance: Chance): Death[] {
  return world.batches
    .filter(({ system }) => system.spec.code === systemCode)
    .flatMap(({ plugs }) => plugs)
    .filter(({ state }) => state === 'rack')
    .filter(() => chance.happens(HEAT_LOSSES))
    .map((plug) => ({ plug, index: index + 1 + chance.int(10), seen: 'bleached', cause: 'heat' }));
}

function weighted(kinds: readonly Kind[], chance: Chance): Kind {
  let left = chance.next() * kinds.reduce((sum, [, , weight]) => sum + weight, 0);
  const found = kinds.find(([, , weight]) => (left -= weight) < 0) ?? kinds[0];
  if (!found) throw new Error('There is no kind of loss.');
  return found;
}

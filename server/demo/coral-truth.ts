import type { GrowthFormCode } from '../../shared/domain/growth.ts';
import type { DemoBatch, DemoSystem, World } from './world.ts';

/** Tissue of a piece, cm² for each cm² of its diameter squared, and what a cm² takes in a day, meq. Rough, for the demo. */
const TISSUE: Record<GrowthFormCode, { area: number; rate: number }> = {
  branching: { area: 2.6, rate: 0.013 },
  staghorn: { area: 2.4, rate: 0.014 },
  plating: { area: 1.1, rate: 0.015 },
  massive: { area: 1.4, rate: 0.011 },
  branching_lps: { area: 1.8, rate: 0.009 },
  fleshy_lps: { area: 1.4, rate: 0.008 },
  wall_lps: { area: 1.6, rate: 0.008 },
  flowerpot: { area: 1.6, rate: 0.008 },
  zoanthid: { area: 0.8, rate: 0.001 },
  mushroom: { area: 0.8, rate: 0.001 },
  leather: { area: 1.2, rate: 0.001 },
  mat: { area: 0.8, rate: 0.001 },
};

/** The inside of a mother is shaded and grows slowly. */
const MOTHER_PART = 0.8;
/** Coralline algae and what precipitates on pumps and walls, meq/L a day. */
const WALLS = 0.02;

/** Mean size of a batch's pieces on a day, mm. */
export function meanSize({ startMm, line, cutIndex }: DemoBatch, index: number): number {
  return startMm + (line.mmPerWeek * Math.max(0, index - cutIndex)) / 7;
}

/** What everything alive in a system takes on a day, meq/L. */
export function trueDemand(world: World, system: DemoSystem, index: number): number {
  let taken = 0;
  for (const batch of world.batches) {
    const ofMeanSize = takenBy(batch.line.form.code, meanSize(batch, index));
    for (const { state, rack, relative } of batch.plugs) {
      if (state === 'rack' && rack?.system === system) taken += ofMeanSize * relative ** 2;
    }
  }
  for (const mother of world.mothers) {
    if (mother.system !== system || mother.from > index) continue;
    taken += MOTHER_PART * takenBy(mother.line.form.code, mother.sizeMm);
  }
  return WALLS + (system.vigour * taken) / system.spec.netVolumeL;
}

function takenBy(form: GrowthFormCode, sizeMm: number): number {
  const { area, rate } = TISSUE[form];
  return area * rate * (sizeMm / 10) ** 2;
}

import type { SystemDemand } from '@shared/contracts/water.ts';
import { limeForStrength } from '@shared/domain/limewater.ts';
import { saturatedStrength, USUAL_VINEGAR_ML_PER_L } from '@shared/domain/limewater-ceiling.ts';

/** What a mix is added to, and the powder it is made of. */
export interface MixBase {
  /** What is left in the reservoir, L and meq/L. */
  before: { levelL: number; alkalinityMeqL: number };
  waterL: number;
  temperatureC: number;
  purity: number;
  acidPercent: number;
}

export interface HoldingMix {
  limeG: number;
  vinegarMl: number;
  /** Whether limewater alone holds the level; if not, it is as strong as vinegar makes it. */
  holds: boolean;
}

type Facts = Pick<SystemDemand, 'demand' | 'carried' | 'ceiling' | 'netVolumeL'>;

/**
 * Lime and vinegar that hold the level at what the system takes and evaporates now.
 *
 * @returns null where demand or evaporation is not known, or nothing is needed
 */
export function holdingMix({ demand, carried, ceiling, netVolumeL }: Facts, base: MixBase): HoldingMix | null {
  if (!demand.enough || demand.low <= 0 || !ceiling || ceiling.evaporationLPerDay <= 0) return null;
  const needed = demand.demand - carried.others - carried.waterChanges;
  if (needed <= 0) return null;
  const wanted = freshStrength((needed * netVolumeL) / ceiling.evaporationLPerDay, base);
  const { waterL, temperatureC } = base;
  const withoutVinegar = saturatedStrength(0, temperatureC);
  const vinegarMlPerL = wanted > withoutVinegar ? USUAL_VINEGAR_ML_PER_L : 0;
  // Vinegar of another acidity dissolves more or less of it.
  const strongest =
    vinegarMlPerL === 0 ? withoutVinegar : saturatedStrength((vinegarMlPerL * base.acidPercent) / 5, temperatureC);
  const vinegarMl = vinegarMlPerL * waterL;
  const limeG = limeForStrength({ ...base, vinegarMl, alkalinityMeqL: Math.min(wanted, strongest) });
  return { limeG: Math.round(limeG), vinegarMl: Math.round(vinegarMl), holds: wanted <= strongest };
}

/** Strength of the new mix that brings the whole, with what is left in the reservoir, to a strength. */
function freshStrength(whole: number, { before, waterL }: MixBase): number {
  const meq = whole * (before.levelL + waterL) - before.alkalinityMeqL * before.levelL;
  return Math.max(0, meq / waterL);
}
